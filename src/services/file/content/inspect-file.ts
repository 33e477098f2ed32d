import { type Failure, failure } from '@/domain/failure';
import {
  type FilePurpose,
  HEIC_WORDS,
  MOST_BYTES,
  MOST_PIXELS,
  tooLargeWords,
} from '@/domain/paperwork/file/limits';
import { findPixels } from '@/domain/paperwork/file/pixel-size';
import { KIND_WORDS, type SniffedKind, sniff } from '@/domain/paperwork/file/sniff';
import { fail, ok, type Result } from '@/domain/result';
import { readSheetRows } from '../../paperwork/sheet/read-sheet-rows';
import type { Ports } from '../../ports';
import type { FileFacts } from './file-facts';
import { inspectPdf } from './inspect-pdf';

const PHOTOGRAPHS: readonly SniffedKind[] = ['jpeg', 'png', 'webp', 'heic'];

const inspectPhotograph = async (
  images: Ports['images'],
  bytes: Uint8Array,
): Promise<Result<FileFacts, Failure>> => {
  const kind = sniff(bytes);
  if (!PHOTOGRAPHS.includes(kind)) {
    const detail = `By its content this is ${KIND_WORDS[kind]}, whatever its name says. Add a JPEG, PNG, WebP or HEIC photograph.`;
    return fail(failure('unsupported-file', detail));
  }
  const pixels = findPixels(bytes, kind);
  if (pixels !== undefined && pixels > MOST_PIXELS) {
    const detail = `This picture has ${Math.round(pixels / 1_000_000)} million pixels; at most ${MOST_PIXELS / 1_000_000} million are taken. Send it in a smaller size.`;
    return fail(failure('too-large', detail));
  }
  const facts = await images.findFacts(bytes);
  if (facts === undefined && kind === 'heic') return fail(failure('unsupported-file', HEIC_WORDS));
  if (facts === undefined) {
    const detail = `${KIND_WORDS[kind].replace(/^a /, 'This ')} is damaged or was cut short on its way. Take or send it again.`;
    return fail(failure('damaged-file', detail));
  }
  return ok({ type: facts.type, width: facts.width, height: facts.height });
};

const inspectSheet = async (bytes: Uint8Array): Promise<Result<FileFacts, Failure>> => {
  const kind = sniff(bytes);
  if (kind === 'pdf') return inspectPdf(bytes);
  if (PHOTOGRAPHS.includes(kind)) {
    const detail =
      'This is a picture. Numbers are read from a CSV or XLSX sheet, or typed in here.';
    return fail(failure('unsupported-file', detail));
  }
  const rows = await readSheetRows(bytes);
  return rows.ok ? ok({ type: rows.value.type, width: null, height: null }) : rows;
};

/** What the bytes are, read from the bytes: neither the name nor the announced type counts. */
export const inspectFile = async (
  images: Ports['images'],
  purpose: FilePurpose,
  bytes: Uint8Array,
): Promise<Result<FileFacts, Failure>> => {
  if (bytes.length === 0) return fail(failure('damaged-file', 'The file is empty.'));
  if (bytes.length > MOST_BYTES[purpose])
    return fail(failure('too-large', tooLargeWords(purpose, bytes.length)));
  return purpose === 'photograph' ? inspectPhotograph(images, bytes) : inspectSheet(bytes);
};
