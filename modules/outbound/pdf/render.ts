import path from "node:path";
import pdfmake from "pdfmake";
import type { TDocumentDefinitions } from "pdfmake/interfaces";
import { allowedDefinition } from "./allowed";
import { FONT_FOLDER, fontFamilies } from "./font-files";

let ready = false;
function prepare(): void {
  if (ready) return;
  pdfmake.setFonts(fontFamilies(FONT_FOLDER));
  pdfmake.setUrlAccessPolicy(() => false);
  pdfmake.setLocalAccessPolicy((file) => path.resolve(file).startsWith(FONT_FOLDER + path.sep));
  ready = true;
}

/**
 * A document as PDF bytes. The same definition and date give the same bytes: a sent invoice can be made again.
 * Pictures are inline PNG or JPEG; vector files, paths and addresses are refused.
 * Takes about 50 ms a page, during which the process does nothing else: long documents belong in a job.
 */
export async function renderPdf(definition: TDocumentDefinitions, options: { creationDate: Date }): Promise<Buffer> {
  prepare();
  const { creationDate } = options;
  const allowed = allowedDefinition(definition);
  return await pdfmake
    .createPdf({
      ...allowed,
      info: { creator: "Valvekeeper", producer: "Valvekeeper", ...allowed.info, creationDate, modDate: creationDate },
    })
    .getBuffer();
}
