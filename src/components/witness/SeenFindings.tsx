import type { InspectionAssessment } from '@/domain/inspection/assess-inspection';
import type { GaugeRecord } from '@/domain/inspection/capture/gauge-record';
import type { Finding } from '@/domain/inspection/finding';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import { GaugeStrip } from '../look/GaugeStrip';
import { ReadingValue } from '../look/ReadingValue';
import { StatusWord } from '../look/StatusWord';
import { markOfState, wordOfState } from '../look/status';
import { shownResult, valueRead } from '../measuring/sheet/shown';

const verdict = ({ pass, state }: Finding): string =>
  pass === null ? wordOfState(state) : `${wordOfState(state)}: ${pass ? 'pass' : 'fail'}`;

/** The result to show large: one that fails, else one that is not plainly within. */
const telling = ({ perPosition }: Finding) =>
  perPosition.find(({ pass }) => pass === false) ??
  perPosition.find(({ state, value }) => value !== undefined && state !== 'within');

/** Every mandatory finding, large, for somebody who stands on the other side of the tablet. */
export const SeenFindings = ({
  rules,
  assessment,
  gauges,
}: {
  readonly rules: RulesInForce;
  readonly assessment: InspectionAssessment;
  readonly gauges: readonly GaugeRecord[];
}) => (
  <ol className="list-rows" aria-label="Findings">
    {assessment.findings
      .filter(({ advisory, state }) => !advisory && state !== 'judged')
      .map((finding) => {
        const clause = rules.clauses.find(({ number }) => number === finding.clause);
        const result = telling(finding);
        const shown = clause && result && shownResult(clause, result);
        const value = clause && result && valueRead(clause, finding, result, gauges);
        const checked = [...new Set(finding.perPosition.flatMap(({ checked: said = [] }) => said))];
        return (
          <li key={finding.clause} className="witness-finding">
            <div className="grow stack">
              <p className="lead">
                <span className="finding-clause">{finding.clause}</span>{' '}
                <strong>{finding.heading}</strong>
              </p>
              {finding.limit !== undefined && <p>{finding.limit}</p>}
              {shown !== undefined && result !== undefined && value !== undefined && (
                <>
                  <p>
                    {result.position}:{' '}
                    <ReadingValue
                      large
                      value={value.text}
                      unit={value.unit}
                      {...(result.uncertainty === undefined || result.coverageFactor === undefined
                        ? {}
                        : {
                            uncertainty: {
                              value: result.uncertainty.text,
                              k: result.coverageFactor,
                            },
                          })}
                    />
                  </p>
                  <GaugeStrip {...shown.strip} size="measuring" />
                </>
              )}
              {result !== undefined &&
                (result.sets ?? result.wants) !== undefined &&
                result.sentence !== finding.sentence && <p>{result.sentence}</p>}
              <p>{finding.sentence}</p>
              {checked.map((words) => (
                <p key={words} className="note">
                  {words[0]?.toUpperCase()}
                  {words.slice(1)}.
                </p>
              ))}
            </div>
            <StatusWord status={markOfState(finding.state)} word={verdict(finding)} size={44} />
          </li>
        );
      })}
  </ol>
);
