import type { PDFDocumentProxy, PDFWorker } from 'pdfjs-dist';

/** Loaded when a sheet is first looked at; the build for older browsers, since a cellar's tablet is seldom the newest. One reader opens every sheet of the visit: it takes longer to come than a sheet to be opened. */
let coming: Promise<{ pdfjs: typeof import('pdfjs-dist'); worker: PDFWorker }> | null = null;
function reader() {
  coming ??= (async () => {
    const pdfjs = await import('pdfjs-dist/legacy/build/pdf.mjs');
    pdfjs.GlobalWorkerOptions.workerSrc = new URL('pdfjs-dist/legacy/build/pdf.worker.min.mjs', import.meta.url).toString();
    const worker = new pdfjs.PDFWorker();
    await worker.promise;
    return { pdfjs, worker };
  })();
  // What did not arrive is asked for again the next time.
  coming.catch(() => (coming = null));
  return coming;
}

/** What a sheet waits for. */
export type Step = 'setting' | 'reader' | 'opening';

/** Fetches the file and opens it. @throws Error with the server's words where there is none. */
export async function openPdf(url: string, signal: AbortSignal, onStep: (step: Step) => void): Promise<PDFDocumentProxy> {
  onStep('setting');
  const [{ pdfjs, worker }, file] = await Promise.all([
    reader(),
    fetch(url, { signal }).then(async (answer) => {
      if (!answer.ok) {
        const problem = (await answer.json().catch(() => null)) as { detail?: string; title?: string } | null;
        throw new Error(problem?.detail ?? problem?.title ?? 'The sheet did not load. Try again.');
      }
      const data = new Uint8Array(await answer.arrayBuffer());
      onStep('reader');
      return data;
    }),
  ]);
  onStep('opening');
  return pdfjs.getDocument({ data: file, worker }).promise;
}

/**
 * Draws a page so many CSS pixels wide; what is on the canvas stays there until the new picture is whole.
 * @returns what stops it, where it is drawn anew before it is done
 */
export function drawPage(pdf: PDFDocumentProxy, page: number, canvas: HTMLCanvasElement, width: number, onDrawn: () => void): () => void {
  let stopped = false;
  let stop = () => {};
  void (async () => {
    const sheet = await pdf.getPage(page);
    if (stopped) return;
    const scale = width / sheet.getViewport({ scale: 1 }).width;
    const viewport = sheet.getViewport({ scale: scale * devicePixelRatio });
    const fresh = document.createElement('canvas');
    fresh.width = Math.floor(viewport.width);
    fresh.height = Math.floor(viewport.height);
    const task = sheet.render({ canvas: fresh, viewport });
    stop = () => task.cancel();
    await task.promise;
    if (stopped) return;
    canvas.width = fresh.width;
    canvas.height = fresh.height;
    canvas.style.width = `${width}px`;
    canvas.style.height = `${viewport.height / devicePixelRatio}px`;
    canvas.getContext('2d')?.drawImage(fresh, 0, 0);
    onDrawn();
  })().catch((error: unknown) => {
    // Cancelled, or its document was closed: a newer one is on its way.
    if (!stopped) throw error;
  });
  return () => {
    stopped = true;
    stop();
  };
}
