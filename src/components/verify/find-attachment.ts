import type { PDFDict } from 'pdf-lib';

/** Beyond this a file is no notice. */
export const MOST_BYTES = 20_000_000;

export const isPdf = (bytes: Uint8Array): boolean =>
  new TextDecoder('latin1').decode(bytes.subarray(0, 5)) === '%PDF-';

/**
 * The text of the file attached to a PDF under this name; nothing when there is none, or when the
 * PDF cannot be read. The reader of PDFs is loaded only when it is needed.
 */
export const findAttachment = async (
  bytes: Uint8Array,
  name: string,
): Promise<string | undefined> => {
  const pdf = await import('pdf-lib');
  const { PDFArray, PDFDict, PDFHexString, PDFName, PDFRawStream, PDFString } = pdf;
  try {
    const document = await pdf.PDFDocument.load(bytes, { updateMetadata: false });
    const inside = (dict: PDFDict | undefined, key: string) =>
      dict?.lookupMaybe(PDFName.of(key), PDFDict);
    const files = inside(inside(document.catalog, 'Names'), 'EmbeddedFiles');
    const names = files?.lookupMaybe(PDFName.of('Names'), PDFArray);
    for (let at = 0; names !== undefined && at + 1 < names.size(); at += 2) {
      const label = names.lookup(at);
      const isText = label instanceof PDFString || label instanceof PDFHexString;
      if (!isText || label.decodeText() !== name) continue;
      const stream = inside(names.lookupMaybe(at + 1, PDFDict), 'EF')?.lookup(PDFName.of('F'));
      if (!(stream instanceof PDFRawStream)) return undefined;
      return new TextDecoder('utf-8', { fatal: true }).decode(
        pdf.decodePDFRawStream(stream).decode(),
      );
    }
  } catch {
    return undefined;
  }
  return undefined;
};
