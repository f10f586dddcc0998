'use client';

import { useEffect, useRef, useState } from 'react';
import type { PDFDocumentProxy } from 'pdfjs-dist';
import { Button } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { useWidth } from '@/components/ui/width';
import { drawPage, openPdf, type Step } from './pdf';

/** While somebody types, the sheet waits until they pause. */
const PAUSE_MS = 250;
/** Nobody looks through more sheets than that on a screen. */
const MOST_SHEETS = 6;
const WIDEST_PX = 860;

/** What is waited for, as the reader is told. */
const STEP_WORDS: Record<Step | 'drawing', string> = {
  setting: '1 of 3: the labels are being set. Many of them take a few seconds.',
  reader: '2 of 3: the sheet is here; what draws it is still loading.',
  opening: '2 of 3: the sheet is here and is being opened.',
  drawing: '3 of 3: the sheet is being drawn.',
};

/** The sheets as they will be printed: the file itself, drawn here, so that a phone without a reader shows it too. */
export function SheetPreview({ url, title }: { url: string; title: string }) {
  const [opened, setOpened] = useState<{ pdf: PDFDocumentProxy; url: string } | null>(null);
  const pdf = opened?.pdf ?? null;
  const [seen, setSeen] = useState<PDFDocumentProxy | null>(null);
  const [step, setStep] = useState<Step>('setting');
  const [wrong, setWrong] = useState<string | null>(null);
  const [attempt, setAttempt] = useState(0);
  const frame = useRef<HTMLDivElement>(null);
  const width = Math.min(WIDEST_PX, useWidth(frame, 600) - 48);
  const first = useRef(true);

  useEffect(() => {
    const abort = new AbortController();
    // Nobody has typed yet when the page opens.
    const pause = first.current ? 0 : PAUSE_MS;
    const timer = setTimeout(() => {
      first.current = false;
      openPdf(url, abort.signal, (next) => !abort.signal.aborted && setStep(next)).then(
        (document) => {
          if (abort.signal.aborted) return void document.destroy();
          setWrong(null);
          setOpened({ pdf: document, url });
        },
        (error: unknown) => {
          if (!abort.signal.aborted) setWrong(error instanceof Error ? error.message : 'The sheet did not load.');
        },
      );
    }, pause);
    return () => {
      clearTimeout(timer);
      abort.abort();
    };
  }, [url, attempt]);
  useEffect(() => () => void pdf?.destroy(), [pdf]);

  const sheets = pdf ? Math.min(MOST_SHEETS, pdf.numPages) : 0;
  const waits = wrong ? null : opened?.url !== url ? step : seen !== pdf ? 'drawing' : null;
  return (
    <div ref={frame} role="group" aria-label={title} className="flex flex-col items-center gap-3 px-6 py-4">
      {wrong && (
        <div role="alert" className="type-body flex w-full flex-wrap items-center gap-3 border-l-[3px] border-madder bg-lit px-3 py-2">
          <span>{wrong}</span>
          <Button onClick={() => setAttempt((before) => before + 1)}>Try again</Button>
        </div>
      )}
      <p role="status" className="type-label min-h-[18px] text-ink2">
        {waits && `${seen ? 'Not yet as asked. ' : ''}${STEP_WORDS[waits]}`}
      </p>
      {!seen && !wrong && <Haze height={560} label="The sheet is on its way" className="w-full max-w-[860px]" />}
      {pdf && Array.from({ length: sheets }, (_, index) => <Sheet key={index} pdf={pdf} page={index + 1} width={width} shown={seen !== null} onDrawn={index === 0 ? () => setSeen(pdf) : NOTHING} label={`${title}: sheet ${index + 1} of ${pdf.numPages}`} />)}
      {pdf && pdf.numPages > sheets && <p className="type-reason text-ink2">{pdf.numPages - sheets} more in the PDF.</p>}
    </div>
  );
}

const NOTHING = () => {};

/** One sheet of paper; white by night too, as it will be. */
function Sheet({ pdf, page, width, shown, onDrawn, label }: { pdf: PDFDocumentProxy; page: number; width: number; shown: boolean; onDrawn: () => void; label: string }) {
  const canvas = useRef<HTMLCanvasElement>(null);
  const drawn = useRef(onDrawn);
  useEffect(() => {
    drawn.current = onDrawn;
  });
  useEffect(() => {
    if (!canvas.current || width < 80) return;
    return drawPage(pdf, page, canvas.current, width, () => drawn.current());
  }, [pdf, page, width]);
  return <canvas ref={canvas} role="img" aria-label={label} className={`mb-2 border ${shown ? 'block' : 'hidden'}`} style={{ background: '#ffffff' }} />;
}
