import { Budgets } from '@/components/finding/Budgets';
import { HoldAdvice } from '@/components/finding/HoldAdvice';
import { Caution } from '@/components/look/Caution';
import { wordOfState } from '@/components/look/status';
import { ResultStrip } from '@/components/tappet/BorePanels';
import { secondSetsWanted } from '@/domain/inspection/second-set/wanted';
import { boreName } from '@/domain/tappet/layout/bore-layout';
import type { Bay } from '../../bay';
import { keyOf } from '../../sheet/flow/asked';
import type { Part } from '../../sheet/parts';
import { nearWords, placesRead, resultAt, shownResult } from '../../sheet/shown';

const tone = {
  outside: 'outside',
  'does-not-comply': 'outside',
  within: 'within',
  complies: 'within',
  'too-close': 'too-close',
} as const;

/** What the complete set comes to, against its clause. */
export const Result = ({ bay, part }: { readonly bay: Bay; readonly part: Part }) => {
  const { position, assessment } = bay;
  const { clause } = part;
  const result = resultAt(assessment.findings, clause?.number, keyOf(part, position));
  if (clause === undefined || result === undefined) return null;
  const finding = assessment.findings.find((one) => one.clause === clause.number);
  const most = finding && placesRead(clause, finding, bay.sheet.gauges);
  const shown = shownResult(clause, result, most);
  const status = result.state in tone ? tone[result.state as keyof typeof tone] : 'set-aside';
  const word = wordOfState(result.state);
  const wanted = secondSetsWanted(assessment).some(({ bore }) => bore === boreName(position));
  return (
    <>
      {shown !== undefined && (
        <ResultStrip
          name={clause.heading}
          value={shown.value}
          uncertaintyText={shown.uncertainty}
          k={shown.k}
          {...shown.strip}
        />
      )}
      <Budgets results={[result]} />
      {part.quantity === 'tappet-bore-diameter' && (
        <HoldAdvice bores={assessment.bores.filter(({ key }) => key === boreName(position))} />
      )}
      <Caution status={status} title={word.charAt(0).toUpperCase() + word.slice(1)}>
        <p>
          {result.state === 'no-statement' || shown === undefined
            ? result.sentence
            : nearWords(shown)}
          {wanted && ' An independent set follows the closing zero, what was read before hidden.'}
        </p>
      </Caution>
    </>
  );
};
