import type { BoreRemedies, RemedyInClass } from '@/domain/inspection/remedies-in-class';
import { formatIn } from '@/domain/quantity/format';
import { down, up } from '@/domain/quantity/round';

const NAMES: Readonly<Record<RemedyInClass['kind'], string>> = {
  'another-lifter': 'Another lifter',
  'bush-back': 'Bush back',
  'next-nominal-size': 'Next nominal size',
};

const PLACES: Readonly<Record<string, number>> = { in: 4, thou: 1, mm: 3, µm: 0 };

/** "0.8763 to 0.8769 in", rounded into the span. */
const span = ({ from, to }: RemedyInClass): string | undefined => {
  if (from === null || to === null) return undefined;
  const places = PLACES[from.unit] ?? 4;
  return `${formatIn(from, from.unit, places, up)} to ${formatIn(to, from.unit, places, down)} ${from.unit}`;
};

const allowedWords = ({ allowed, clause }: RemedyInClass): string => {
  if (allowed === null) return 'The rules do not say: ask the officials before any work';
  return `${allowed ? 'The class allows it' : 'The class does not allow it'}, clause ${clause ?? ''}`;
};

const Remedy = ({ remedy }: { readonly remedy: RemedyInClass }) => {
  const sizes = span(remedy);
  return (
    <li className="mt-2">
      <strong>{NAMES[remedy.kind]}</strong>
      {remedy.nominal !== undefined && `, ${remedy.nominal.text} ${remedy.nominal.unit}`}.{' '}
      {remedy.words} {sizes !== undefined && <span className="num">{sizes}.</span>}{' '}
      {sizes !== undefined && <strong>{allowedWords(remedy)}.</strong>}{' '}
      <span className="note">{remedy.caution}</span>
    </li>
  );
};

/** What could be done about each bore outside its clearance window; nothing where none is. */
export const Remedies = ({ bores }: { readonly bores: readonly BoreRemedies[] }) =>
  bores.length === 0 ? null : (
    <details>
      <summary>
        What can be done about {bores.length === 1 ? 'this bore' : `these ${bores.length} bores`}
      </summary>
      {bores.map(({ position, remedies }) => (
        <div key={position} className="mt-3">
          <p className="font-semibold">{position}</p>
          <ul>
            {remedies.map((remedy) => (
              <Remedy key={remedy.kind} remedy={remedy} />
            ))}
          </ul>
        </div>
      ))}
      <p className="note mt-2">
        Common practice, as advice. The engine and cam maker’s own specification governs.
      </p>
    </details>
  );
