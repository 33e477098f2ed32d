import { writtenWords } from '../../rulebook/describe';
import { getQuantityEntry } from '../../rulebook/quantity-catalogue';
import type { InspectionAssessment } from '../assess-inspection';
import type { GaugeRecord } from '../capture/gauge-record';
import type { JudgedReading } from '../capture/readings-that-count';
import { inTakingOrder, positionKey, type RemarkRow, type ZeroRow } from '../capture/rows';

/** Readings of one quantity by one gauge and on one zero, at the same places in the same order. */
export interface ReadingsGroup {
  /** `Lifter body diameter`. */
  readonly label: string;
  readonly unit: string;
  readonly gauge: string;
  /** `zeroed on the ring SR-03, 0.8440 in: opened 0.0, closed 0.1 thou`; empty for an absolute reading. */
  readonly zero: string;
  /** `above, along`. */
  readonly places: readonly string[];
  readonly rows: readonly { readonly position: string; readonly values: readonly string[] }[];
}

export interface MandatoryReadings {
  readonly groups: readonly ReadingsGroup[];
  /** Checks without a number, `tappet-type` at a position: the last answer. */
  readonly checks: readonly { readonly subject: string; readonly answers: readonly string[] }[];
  /** What the mandatory clauses come to, by number. */
  readonly findings: readonly {
    readonly clause: string;
    readonly heading: string;
    readonly pass: boolean | null;
    readonly sentence: string;
  }[];
  readonly readings: number;
}

interface Bay {
  readonly zeros: readonly ZeroRow[];
  readonly remarks: readonly RemarkRow[];
  readonly gauges: readonly Pick<GaugeRecord, 'id' | 'code'>[];
}

const zeroWords = (runId: string | undefined, { zeros, gauges }: Bay): string => {
  const run = inTakingOrder(zeros).filter((zero) => zero.runId === runId);
  const opening = run.find(({ kind }) => kind === 'opening');
  if (runId === undefined || opening === undefined) return '';
  const closing = run.findLast(({ kind }) => kind === 'closing');
  const ring = gauges.find(({ id }) => id === opening.ringId)?.code;
  const on =
    ring === undefined
      ? 'zeroed on its lifter'
      : `zeroed on the ring ${ring}${opening.size === undefined ? '' : `, ${writtenWords(opening.size)}`}`;
  const closed = closing === undefined ? 'not closed' : `closed ${closing.reading.text}`;
  return `${on}: opened ${opening.reading.text}, ${closed} ${opening.reading.unit}`;
};

const placeWords = ({ row }: JudgedReading): string =>
  [row.depth, row.axis].filter((part) => part !== '').join(', ');

const grouped = <T>(items: readonly T[], keyOf: (item: T) => string): readonly (readonly T[])[] => {
  const groups = new Map<string, T[]>();
  for (const item of items) {
    const key = keyOf(item);
    groups.set(key, [...(groups.get(key) ?? []), item]);
  }
  return [...groups.values()];
};

const groupsOf = (readings: readonly JudgedReading[], bay: Bay): readonly ReadingsGroup[] => {
  const alike = grouped(readings, ({ row }) =>
    [row.quantity, row.gaugeId, row.value.unit, row.zeroRunId ?? '', row.set].join('\n'),
  );
  return alike.flatMap((of) => {
    const positions = grouped(of, ({ row, place }) =>
      positionKey(place, getQuantityEntry(row.quantity).per),
    );
    return grouped(positions, (at) => at.map(placeWords).join('\n')).flatMap(
      (same): readonly ReadingsGroup[] => {
        const first = same[0]?.[0];
        if (first === undefined) return [];
        const { row } = first;
        const entry = getQuantityEntry(row.quantity);
        return [
          {
            label: row.set > 1 ? `${entry.label}, set ${row.set}` : entry.label,
            unit: row.value.unit,
            gauge: bay.gauges.find(({ id }) => id === row.gaugeId)?.code ?? '–',
            zero: zeroWords(row.zeroRunId, bay),
            places: same[0]?.map(placeWords) ?? [],
            rows: same.map((at) => ({
              position: at[0] === undefined ? '' : positionKey(at[0].place, entry.per),
              values: at.map(({ row: one }) => one.value.text),
            })),
          },
        ];
      },
    );
  });
};

const checksOf = (ids: ReadonlySet<string>, remarks: readonly RemarkRow[]) =>
  grouped(
    inTakingOrder(remarks).filter(({ id }) => ids.has(id)),
    ({ subject }) => subject,
  ).map((rows) => {
    const last = new Map(
      rows.map(({ place, answer }) => [positionKey(place, 'bore'), answer.value ?? '']),
    );
    const answers = [...last];
    const same = new Set(answers.map(([, answer]) => answer));
    return {
      subject: rows[0]?.subject ?? '',
      answers:
        same.size === 1
          ? [...same].map((answer) =>
              answers.length === 1 ? answer : `${answer} at all ${answers.length}`,
            )
          : answers.map(([position, answer]) => `${position} ${answer}`),
    };
  });

/**
 * Everything that the mandatory clauses stand on, in taking order: what the competitor's side takes
 * along. Advisory readings stay out, struck ones too.
 */
export const mandatoryReadings = (
  { findings, judged }: Pick<InspectionAssessment, 'findings' | 'judged'>,
  bay: Bay,
): MandatoryReadings => {
  const mandatory = findings.filter(({ advisory }) => !advisory);
  const ids = new Set(mandatory.flatMap(({ readings }) => readings));
  const checks = new Set(mandatory.flatMap((finding) => finding.checks));
  const readings = judged.filter(({ row, state }) => state === 'counts' && ids.has(row.id));
  return {
    groups: groupsOf(readings, bay),
    checks: checksOf(checks, bay.remarks),
    findings: mandatory
      .filter(({ state }) => state !== 'judged')
      .map(({ clause, heading, pass, sentence }) => ({ clause, heading, pass, sentence })),
    readings: readings.length,
  };
};
