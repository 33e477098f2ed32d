import type { Fault } from '@/domain/failure';
import type { Written } from '@/domain/quantity/dimension';
import type { GaugeListed } from '@/services/gauge/list-gauges';

const typedOf = (written: Written | undefined): string =>
  written === undefined ? '' : `${written.text} ${written.unit}`;

/** The form's fields for a gauge as it stands, or for a new one. */
export const fieldsOf = (
  gauge: GaugeListed | undefined,
  newId: string,
): ReadonlyMap<string, string> =>
  new Map(
    Object.entries({
      id: gauge?.id ?? newId,
      version: String(gauge?.version ?? 0),
      code: gauge?.code ?? '',
      kind: gauge?.kind ?? 'micrometer',
      name: gauge?.name ?? '',
      division: typedOf(gauge?.division),
      from: typedOf(gauge?.range?.from),
      to: typedOf(gauge?.range?.to),
      size: typedOf(gauge?.size),
      largerReads: gauge?.largerReads ?? '',
      certificateFile: gauge?.certificateFile ?? '',
      number: gauge?.certificate?.number ?? '',
      uncertainty: typedOf(gauge?.certificate?.expandedUncertainty),
      coverageFactor: gauge?.certificate?.coverageFactor ?? '2',
      calibratedOn: gauge?.calibratedOn ?? '',
      dueOn: gauge?.dueOn ?? '',
      status: gauge?.withdrawn ? 'withdrawn' : 'in-use',
    }),
  );

/** "0.0001 in" as text and unit; the contract says what is wrong with either. */
const writtenOf = (typed: string): Written | undefined => {
  const [, text = '', unit = ''] = /^(\S*)\s*(.*)$/.exec(typed.trim()) ?? [];
  return text === '' ? undefined : { text, unit };
};

/** The posted fields in the contract's shape, before they are checked by it. */
export const gaugeFromForm = (typed: ReadonlyMap<string, string>): unknown => {
  const text = (name: string) => (typed.get(name) ?? '').trim();
  const some = <V>(key: string, value: V | undefined | '') =>
    value === undefined || value === '' ? {} : { [key]: value };
  const from = writtenOf(text('from'));
  const to = writtenOf(text('to'));
  const uncertainty = writtenOf(text('uncertainty'));
  return {
    act: text('act'),
    id: text('id'),
    code: text('code'),
    status: text('status'),
    version: Number(text('version')),
    description: {
      kind: text('kind'),
      name: text('name'),
      ...some('division', writtenOf(text('division'))),
      ...(from || to
        ? { range: { from: from ?? { text: '', unit: '' }, to: to ?? { text: '', unit: '' } } }
        : {}),
      ...some('size', writtenOf(text('size'))),
      ...some('largerReads', text('largerReads')),
      ...(uncertainty || text('number') !== ''
        ? {
            certificate: {
              number: text('number'),
              expandedUncertainty: uncertainty ?? { text: '', unit: '' },
              coverageFactor: text('coverageFactor'),
            },
          }
        : {}),
      ...some('certificateFile', text('certificateFile')),
      ...some('calibratedOn', text('calibratedOn')),
      ...some('dueOn', text('dueOn')),
    },
  };
};

const FIELD: Record<string, string> = { expandedUncertainty: 'uncertainty' };
const KNOWN = [
  'code',
  'kind',
  'name',
  'division',
  'from',
  'to',
  'size',
  'largerReads',
  'number',
  'uncertainty',
  'coverageFactor',
  'calibratedOn',
  'dueOn',
];

/** Faults by the form's own fields; the pointer's last known step names the field. */
export const problemsAt = (faults: readonly Fault[]) =>
  faults.map(({ pointer, detail }) => {
    const steps = pointer.split('/').map((step) => FIELD[step] ?? step);
    const field = steps.findLast((step) => KNOWN.includes(step));
    return field === undefined ? { message: detail } : { field, message: detail };
  });
