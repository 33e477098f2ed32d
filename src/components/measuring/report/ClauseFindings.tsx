import { Budgets } from '@/components/finding/Budgets';
import { HoldAdvice } from '@/components/finding/HoldAdvice';
import { Remedies } from '@/components/finding/Remedies';
import { FindingRow, FindingTable } from '@/components/look/FindingRow';
import { StatusWord } from '@/components/look/StatusWord';
import { markOfState, type Status, wordOfState } from '@/components/look/status';
import type { InspectionAssessment } from '@/domain/inspection/assess-inspection';
import type { GaugeRecord } from '@/domain/inspection/capture/gauge-record';
import type { Finding } from '@/domain/inspection/finding';
import { remediesInClass } from '@/domain/inspection/remedies-in-class';
import type { Clause } from '@/domain/rulebook/clause';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import { placesRead, shownResult } from '../sheet/shown';

interface ClauseFindingsProps {
  readonly rules: RulesInForce;
  readonly assessment: InspectionAssessment;
  readonly gauges: readonly GaugeRecord[];
}

const BREACHING: readonly string[] = ['outside', 'does-not-comply', 'too-close', 'no-statement'];

const ofClearance = ({ requirement }: Clause): boolean =>
  requirement?.kind === 'limit' && requirement.quantity === 'tappet-clearance';

const passWord = (pass: boolean | null, state: Finding['state']): string =>
  pass === null ? wordOfState(state) : `${wordOfState(state)}: ${pass ? 'pass' : 'fail'}`;

const Sentences = ({ results }: { readonly results: Finding['perPosition'] }) => (
  <ul>
    {results.map(({ position, sentence }) => (
      <li key={position}>{sentence}</li>
    ))}
  </ul>
);

const Numbers = ({
  clause,
  finding,
  gauges,
}: {
  readonly clause: Clause;
  readonly finding: Finding;
  readonly gauges: readonly GaugeRecord[];
}) => {
  const most = placesRead(clause, finding, gauges);
  const rows = finding.perPosition.flatMap((result) => {
    const shown = shownResult(clause, result, most);
    return shown === undefined ? [] : [{ result, shown }];
  });
  const [first] = rows;
  if (first === undefined)
    return <Sentences results={finding.perPosition.filter(({ value }) => value !== undefined)} />;
  return (
    <FindingTable
      unit={first.shown.unit}
      k={first.shown.k}
      against={finding.limit ?? ''}
      subject="Where"
    >
      {rows.map(({ result, shown }) => (
        <FindingRow
          key={result.position}
          subject={result.position}
          value={shown.value}
          uncertainty={shown.uncertainty}
          strip={shown.strip}
          status={markOfState(result.state)}
          finding={passWord(result.pass, result.state)}
        />
      ))}
    </FindingTable>
  );
};

const Others = ({ finding }: { readonly finding: Finding }) => {
  const told = finding.perPosition.filter(
    ({ value, state, sentence }) =>
      value === undefined && state !== 'not-measured' && sentence !== finding.sentence,
  );
  const unusual = told.filter((result) => BREACHING.includes(result.state));
  const shown = unusual.length > 0 ? unusual : told.slice(0, 1);
  return (
    <ul>
      {shown.map((result) => (
        <li key={result.position}>{result.sentence}</li>
      ))}
    </ul>
  );
};

/** Every clause with its statement, its numbers on their strips, the rule's sentence, and the budget. */
export const ClauseFindings = ({ rules, assessment, gauges }: ClauseFindingsProps) => {
  const { findings, bores, facts } = assessment;
  return (
    <div className="grid gap-8 mt-5">
      {findings.map((finding) => {
        const clause = rules.clauses.find((one) => one.number === finding.clause);
        if (clause === undefined) return null;
        const status: Status = markOfState(finding.state);
        const rule = finding.perPosition.find((result) => result.rule !== undefined)?.rule;
        return (
          <section key={finding.clause}>
            <div className="section-head ruled">
              <h3>
                <span className="finding-clause">{finding.clause}</span> {finding.heading}
                {finding.advisory && <span className="note"> advisory</span>}
              </h3>
              <StatusWord status={status} word={passWord(finding.pass, finding.state)} />
            </div>
            <p>{finding.sentence}</p>
            {rule !== undefined && <p className="note">{rule}</p>}
            {[...new Set(finding.perPosition.flatMap(({ checked = [] }) => checked))].map(
              (words) => (
                <p key={words} className="note">
                  {words.charAt(0).toUpperCase() + words.slice(1)}.
                </p>
              ),
            )}
            {finding.cautions.map((caution) => (
              <p key={caution} className="note">
                {caution}
              </p>
            ))}
            {finding.perPosition.some((result) => result.value !== undefined) ? (
              <>
                <Sentences
                  results={finding.perPosition.filter(
                    ({ sets, wants, sentence }) =>
                      (sets ?? wants) !== undefined && sentence !== finding.sentence,
                  )}
                />
                <details open={BREACHING.includes(finding.state)}>
                  <summary>Numbers, each with its uncertainty</summary>
                  <Numbers clause={clause} finding={finding} gauges={gauges} />
                </details>
                <Budgets results={finding.perPosition} />
                {ofClearance(clause) && <HoldAdvice bores={bores} />}
                <Remedies
                  bores={remediesInClass(
                    clause,
                    { clauses: rules.clauses, results: findings },
                    facts,
                  )}
                />
              </>
            ) : (
              <Others finding={finding} />
            )}
          </section>
        );
      })}
    </div>
  );
};
