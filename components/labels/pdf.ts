import type { PDFDocumentProxy } from 'pdfjs-dist';

/** Loaded when a sheet is first looked at; the build for older browsers, since a cellar's tablet is seldom the newest. */
async function reader() {
  const pdfjs = await import('pdfjs-dist/legacy/build/pdf.mjs');
  pdfjs.GlobalWorkerOptions.workerSrc = new URL('pdfjs-dist/legacy/build/pdf.worker.min.mjs', import.meta.url).toString();
  return pdfjs;
}

/** Fetches the file and opens it. @throws Error with the server's words where there is none. */
export async function openPdf(url: string, signal: AbortSignal): Promise<PDFDocumentProxy> {
  const [pdfjs, answer] = await Promise.all([reader(), fetch(url, { signal })]);
  if (!answer.ok) {
    const problem = (await answer.json().catch(() => null)) as { detail?: string; title?: string } | null;
    throw new Error(problem?.detail ?? problem?.title ?? 'The sheet did not load. Try again.');
  }
  return pdfjs.getDocument({ data: new Uint8Array(await answer.arrayBuffer()) }).promise;
}

/** Draws a page so many CSS pixels wide. @returns what stops it, where it is drawn anew before it is done. */
export function drawPage(pdf: PDFDocumentProxy, page: number, canvas: HTMLCanvasElement, width: number): () => void {
  let stopped = false;
  let stop = () => {};
  void (async () => {
    const sheet = await pdf.getPage(page);
    if (stopped) return;
    const scale = width / sheet.getViewport({ scale: 1 }).width;
    const viewport = sheet.getViewport({ scale: scale * devicePixelRatio });
    canvas.width = Math.floor(viewport.width);
    canvas.height = Math.floor(viewport.height);
    canvas.style.width = `${width}px`;
    canvas.style.height = `${viewport.height / devicePixelRatio}px`;
    const task = sheet.render({ canvas, viewport });
    stop = () => task.cancel();
    await task.promise;
  })().catch((error: unknown) => {
    // Cancelled, or its document was closed: a newer one is on its way.
    if (!stopped) throw error;
  });
  return () => {
    stopped = true;
    stop();
  };
}
