import * as z from 'zod/mini';
import type { Failure } from '@/domain/failure';
import { ok, type Result } from '@/domain/result';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import { readBody } from '../read-body';
import { clauses, penalties } from './clause';
import { clarification, waiver } from './edition';
import { clauseNumber, short, whole } from './text';

const shape = z.strictObject({
  document: z.literal('tagwire/rules-in-force'),
  version: z.literal('1'),
  className: short,
  season: short,
  edition: whole,
  clauses,
  penalties,
  bulletins: z.array(whole),
  clarifications: z.array(clarification),
  waivers: z.array(waiver),
  withdrawals: z.optional(z.array(whole)),
  sources: z.array(
    z.strictObject({
      clause: clauseNumber,
      edition: whole,
      bulletin: z.optional(whole),
    }),
  ),
});

/** The rules in force back from their stored document (parsed JSON), numbers as numbers again. */
export const readRulesDocument = (parsed: unknown): Result<RulesInForce, Failure> => {
  const read = readBody(shape, parsed);
  if (!read.ok) return read;
  const { document: _document, version: _version, ...rules } = read.value;
  return ok(rules);
};
