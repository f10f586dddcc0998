'use client';

import { useEffect, useRef, useState } from 'react';
import type { PDFDocumentProxy } from 'pdfjs-dist';
import { Button } from '@/components/ui/Button';
import { Haze } from '@/components/ui/Haze';
import { useWidth } from '@/components/ui/width';
import { drawPage, openPdf } from './pdf';

/** While somebody types, the sheet waits until they pause. */
const PAUSE_MS = 250;
/** Nobody looks through more sheets than that on a screen. */
const MOST_SHEETS = 6;
const WIDEST_PX = 860;

/** The sheets as they will be printed: the file itself, drawn here, so that a phone without a reader shows it too. */
export function SheetPreview({ url, title }: { url: string; title: string }) {
  const [drawn, setDrawn] = useState<{ pdf: PDFDocumentProxy; url: string } | null>(null);
  const pdf = drawn?.pdf ?? null;
  const [wrong, setWrong] = useState<string | null>(null);
  const [attempt, setAttempt] = useState(0);
  const frame = useRef<HTMLDivElement>(null);
  const width = Math.min(WIDEST_PX, useWidth(frame, 600) - 48);

  useEffect(() => {
    const abort = new AbortController();
    const timer = setTimeout(() => {
      openPdf(url, abort.signal).then(
        (opened) => {
          if (abort.signal.aborted) return void opened.destroy();
          setWrong(null);
          setDrawn({ pdf: opened, url });
        },
        (error: unknown) => {
          if (!abort.signal.aborted) setWrong(error instanceof Error ? error.message : 'The sheet did not load.');
        },
      );
    }, PAUSE_MS);
    return () => {
      clearTimeout(timer);
      abort.abort();
    };
  }, [url, attempt]);
  useEffect(() => () => void pdf?.destroy(), [pdf]);

  const sheets = pdf ? Math.min(MOST_SHEETS, pdf.numPages) : 0;
  return (
    <div ref={frame} role="group" aria-label={title} className="flex flex-col items-center gap-5 px-6 py-5">
      {wrong && (
        <div role="alert" className="type-body flex w-full flex-wrap items-center gap-3 border-l-[3px] border-madder bg-lit px-3 py-2">
          <span>{wrong}</span>
          <Button onClick={() => setAttempt((before) => before + 1)}>Try again</Button>
        </div>
      )}
      {!pdf && !wrong && <Haze height={560} label="Drawing the sheet" className="w-full max-w-[860px]" />}
      {drawn && (
        <p role="status" className="type-label min-h-[18px] text-ink2">
          {drawn.url !== url && !wrong ? 'Not yet as asked: the sheet is drawn anew.' : ''}
        </p>
      )}
      {pdf && Array.from({ length: sheets }, (_, index) => <Sheet key={index} pdf={pdf} page={index + 1} width={width} label={`${title}: sheet ${index + 1} of ${pdf.numPages}`} />)}
      {pdf && pdf.numPages > sheets && <p className="type-reason text-ink2">{pdf.numPages - sheets} more in the PDF.</p>}
    </div>
  );
}

/** One sheet of paper; white by night too, as it will be. */
function Sheet({ pdf, page, width, label }: { pdf: PDFDocumentProxy; page: number; width: number; label: string }) {
  const canvas = useRef<HTMLCanvasElement>(null);
  useEffect(() => {
    if (!canvas.current || width < 80) return;
    return drawPage(pdf, page, canvas.current, width);
  }, [pdf, page, width]);
  return <canvas ref={canvas} role="img" aria-label={label} className="block border bg-white" />;
}
