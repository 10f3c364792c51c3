import { createRequire } from 'node:module';
import { dirname, join } from 'node:path';
import pdfMake from 'pdfmake';
import type { TDocumentDefinitions } from 'pdfmake/interfaces';

export const FONT = 'NotoSans';

let isPrepared = false;

/** Prints a document with Noto Sans embedded. Nothing is fetched, and no file but the fonts is read. */
export async function printPdf(definition: TDocumentDefinitions): Promise<Buffer> {
  if (!isPrepared) prepare();
  isPrepared = true;
  return pdfMake.createPdf(definition).getBuffer();
}

function prepare(): void {
  const root = dirname(createRequire(import.meta.url).resolve('@expo-google-fonts/noto-sans/package.json'));
  const font = (weight: string) => join(root, weight, `NotoSans_${weight}.ttf`);
  pdfMake.setFonts({
    [FONT]: {
      normal: font('400Regular'),
      bold: font('700Bold'),
      italics: font('400Regular_Italic'),
      bolditalics: font('700Bold_Italic'),
    },
  });
  pdfMake.setUrlAccessPolicy(() => false);
  pdfMake.setLocalAccessPolicy((path) => path.startsWith(root));
}
