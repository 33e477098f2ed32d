import { LockMode } from '@mikro-orm/core';
import type { GaugeFaultRequest } from '@/contracts/gauge/check';
import { type Actor, may } from '@/domain/access/permission';
import { absent, type Failure, invalid } from '@/domain/failure';
import { canonicalJson } from '@/domain/ledger/canonical';
import { fail, ok, type Result } from '@/domain/result';
import { toDocument } from '@/domain/rulebook/document';
import { GaugeRow } from '@/entities/event/gauge';
import { performAct } from '../act/perform-act';
import { queueMail } from '../mail/queue-mail';
import { officialsOf } from '../people/officials-of';
import type { Ports } from '../ports';
import { gaugeEntryText } from './gauge-entry';
import { findLastGood } from './last-good';
import { lookBack } from './review/look-back';

/**
 * A gauge was found bad. It is withdrawn, the look-back since its last good check opens a review for
 * every verdict that relied on it, and the officials are told. No finding and no verdict changes.
 */
export const reportGaugeBad = async (
  deps: Pick<Ports, 'db' | 'clock' | 'random' | 'jobs' | 'site'>,
  actor: Actor,
  input: GaugeFaultRequest & { readonly seriesId: string },
): Promise<Result<{ readonly id: string; readonly reviews: number }, Failure>> => {
  const { act, seriesId, ...fault } = input;
  if (!may(actor, 'gauge.manage', seriesId)) return fail(absent());
  return performAct(
    deps,
    actor,
    { id: act, kind: 'report-gauge-bad', seriesId, input: toDocument(fault) },
    async ({ em, at, append, line, send }) => {
      const { id, gaugeId, off } = fault;
      const foundAt = new Date(fault.foundAt).toISOString();
      const gauge = await em.findOne(
        GaugeRow,
        { seriesId, id: gaugeId },
        { lockMode: LockMode.PESSIMISTIC_WRITE },
      );
      if (gauge === null) return fail(absent());
      if (Date.parse(foundAt) > at.getTime())
        return fail(invalid([{ pointer: '/foundAt', detail: 'This lies in the future.' }]));
      const good = await findLastGood(em, gauge, foundAt);
      const relied = await lookBack(em, seriesId, { gaugeId, after: good.at, until: foundAt });
      const verdicts = relied.reports.flatMap(({ verdict }) =>
        verdict?.reviewed === true ? [verdict] : [],
      );
      gauge.status = 'withdrawn';
      await em.flush();
      const recorded = { series_id: seriesId, recorded_by: actor.personId };
      append('gauge_entry', [
        {
          ...recorded,
          id: deps.random.uuid(),
          gauge_id: gaugeId,
          document: gaugeEntryText(gauge),
        },
      ]);
      append('gauge_fault', [
        {
          ...recorded,
          id,
          gauge_id: gaugeId,
          found_at: foundAt,
          good_until: good.at ?? null,
          good_because: good.because,
          off_text: off?.text ?? null,
          off_unit: off?.unit ?? null,
          reason: fault.reason.trim(),
        },
      ]);
      append(
        'review_act',
        verdicts.map((verdict) => ({
          ...recorded,
          id: deps.random.uuid(),
          review_id: deps.random.uuid(),
          fault_id: id,
          verdict_id: verdict.id,
          kind: 'opened',
          acted_at: at.toISOString(),
          reason: '',
        })),
      );
      const numbers = verdicts.map(({ number }) => number);
      line({
        seriesId,
        kind: 'gauge-found-bad',
        contents: {
          fault: {
            text: canonicalJson(
              toDocument({
                document: 'tagwire/gauge-fault',
                version: '1',
                ...fault,
                foundAt,
                goodUntil: good.at,
                goodBecause: good.because,
                inspections: relied.reports.map(({ inspectionId }) => inspectionId),
                reviewed: numbers,
                by: actor.personId,
              }),
            ),
            open: false,
          },
        },
        refs: { gauge: gaugeId },
      });
      for (const official of await officialsOf(em, seriesId)) {
        queueMail(
          deps,
          em,
          { send, at },
          {
            seriesId,
            personId: official.id,
            address: official.email,
            kind: 'gauge-found-bad',
            subject: `Gauge ${gauge.code} was found bad: ${numbers.length === 0 ? 'no verdict relied on it' : `${numbers.length} under review`}`,
            paragraphs: [
              `Gauge ${gauge.code} was found bad. ${fault.reason.trim()}`,
              `What it read since ${good.because} is in doubt: ${relied.reports.length} signed reports have findings that rely on it.`,
              numbers.length === 0
                ? 'No verdict relied on it.'
                : `A review is open for ${numbers.length === 1 ? 'notice' : 'notices'} ${numbers.join(', ')}. Nothing was changed: an official says of each whether it stands or is to be decided again.`,
            ],
            next:
              numbers.length === 0
                ? 'nothing to do: no verdict relied on it.'
                : 'look at each notice and say whether it stands.',
            link: {
              label: 'See what relied on it',
              path: `/crib/${seriesId}/${gaugeId}/faults/${id}`,
            },
          },
        );
      }
      return ok({ id, reviews: verdicts.length });
    },
  );
};
