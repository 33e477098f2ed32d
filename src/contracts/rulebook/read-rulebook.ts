import type * as z from 'zod/mini';
import { type Failure, invalid } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { findAmbiguities } from '@/domain/rulebook/ambiguity/find-ambiguities';
import { readBody } from '../read-body';
import { bulletinContent, rulebookContent, rulebookFile } from './edition';

export type RulebookContent = z.output<typeof rulebookContent>;
export type RulebookFile = z.output<typeof rulebookFile>;
export type BulletinContent = z.output<typeof bulletinContent>;

/** A draft's content by its shape; it may still be ambiguous. */
export const readRulebookContent = (body: unknown): Result<RulebookContent, Failure> =>
  readBody(rulebookContent, body);

/** A bulletin's draft by its shape; what keeps it from being published is asked with the rules in force. */
export const readBulletinContent = (body: unknown): Result<BulletinContent, Failure> =>
  readBody(bulletinContent, body);

/** An imported file: every fault with its place, shape first, and nothing taken by half. */
export const readRulebookFile = (body: unknown): Result<RulebookFile, Failure> =>
  readBody(rulebookFile, body);

/** Content that may be published: sound in shape and with nothing left open. */
export const readPublishable = (body: unknown): Result<RulebookContent, Failure> => {
  const read = readBody(rulebookContent, body);
  if (!read.ok) return read;
  const faults = findAmbiguities(read.value.clauses, read.value.penalties);
  return faults.length === 0 ? ok(read.value) : fail(invalid(faults));
};
