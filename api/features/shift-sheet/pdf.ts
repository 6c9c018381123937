import { createRequire } from 'node:module';
import pdfmake from 'pdfmake';
import type { TDocumentDefinitions } from 'pdfmake/interfaces.js';

const find = createRequire(import.meta.url).resolve;
const FAMILY = '@expo-google-fonts/atkinson-hyperlegible-next';
const font = (weight: string) => find(`${FAMILY}/${weight}/AtkinsonHyperlegibleNext_${weight}.ttf`);

/** The application's own type, from the files that come with its package. */
const FONTS = {
  Atkinson: {
    normal: font('400Regular'),
    bold: font('700Bold'),
    italics: font('400Regular_Italic'),
    bolditalics: font('700Bold_Italic'),
  },
};

pdfmake.setFonts(FONTS);
// A document is made of what it is given: nothing is fetched, no other file is read.
pdfmake.setUrlAccessPolicy(() => false);
pdfmake.setLocalAccessPolicy((path) => Object.values(FONTS.Atkinson).includes(path));

/** Takes a second of a processor: call it in a worker, not where taps are waiting. */
export async function makePdf(document: TDocumentDefinitions): Promise<Uint8Array> {
  return new Uint8Array(await pdfmake.createPdf(document).getBuffer());
}
