import { PDFDocument } from 'pdf-lib';
import type { NoticePrinter } from '@/services/ports';
import { paginate } from './flow';
import { drawFoot, drawFrame } from './frame';
import { drawMasthead, drawRunningHead } from './masthead';
import { POINTS, penOn, SHEET } from './pen';
import { sectionsOf } from './sections';
import { openTypefaces } from './typeface/typeface';

const FIRST = 138;
const LATER = 104;

/**
 * Prints a notice on A4, black only. Names print in Latin, Greek and Cyrillic letters; a name in another
 * script prints in the Latin form that the person gave, and where none was given its letters stand as ¤.
 */
export const noticePrinter: NoticePrinter = {
  print: async (input) => {
    const { notice, attachment } = input;
    const at = new Date(notice.publishedAt);
    const document = await PDFDocument.create({ updateMetadata: false });
    document.setTitle(`Notice ${notice.number} of a verdict, car ${notice.car}`, {
      showInWindowTitleBar: true,
    });
    document.setAuthor(notice.series.name);
    document.setProducer('Tagwire');
    document.setCreator('Tagwire');
    document.setLanguage('en');
    document.setCreationDate(at);
    document.setModificationDate(at);
    await document.attach(new TextEncoder().encode(attachment.text), attachment.name, {
      mimeType: 'application/json',
      description: 'The notice as it was published, with what proves it',
      creationDate: at,
      modificationDate: at,
    });
    const type = await openTypefaces(document, JSON.stringify(notice));
    const pages = paginate(sectionsOf(notice, type), { first: FIRST, later: LATER });
    for (const [place, placements] of pages.entries()) {
      const page = document.addPage([SHEET.width * POINTS, SHEET.height * POINTS]);
      const pen = penOn(page, type);
      drawFrame(pen);
      if (place === 0) drawMasthead(pen, notice);
      else drawRunningHead(pen, notice);
      for (const placement of placements) placement.draw(pen);
      drawFoot(pen, input, { number: place + 1, of: pages.length });
    }
    return document.save({ useObjectStreams: false });
  },
};
