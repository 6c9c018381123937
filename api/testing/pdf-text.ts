import { getDocument } from 'pdfjs-dist/legacy/build/pdf.mjs';

/** A word of a page: where it stands (points, from the top left) and what it says. */
export interface PdfWord {
  readonly page: number;
  readonly x: number;
  readonly y: number;
  readonly text: string;
}

/** What a PDF says, page by page, as somebody reads it who did not make it. */
export async function pdfWords(pdf: Uint8Array): Promise<PdfWord[]> {
  const task = getDocument({ data: new Uint8Array(pdf), useSystemFonts: false, verbosity: 0 });
  const document = await task.promise;
  const words: PdfWord[] = [];
  for (let page = 1; page <= document.numPages; page++) {
    const shown = await document.getPage(page);
    const { height } = shown.getViewport({ scale: 1 });
    for (const item of (await shown.getTextContent()).items) {
      if (!('str' in item) || item.str.trim() === '') continue;
      const [, , , , x, y] = item.transform as number[];
      words.push({ page, x: x ?? 0, y: height - (y ?? 0), text: item.str });
    }
  }
  await task.destroy();
  return words;
}
