import { useEffect, useRef, useState } from 'react';
import { padKeyOf, padMayTake } from '@/components/tappet/keys';
import type { CheckAsk } from '@/domain/inspection/plan/check-asks';
import { findAnswer } from '@/domain/rulebook/evaluate/facts';
import { type BorePosition, boreName } from '@/domain/tappet/layout/bore-layout';
import type { Bay, Hands } from '../../bay';
import { checkRow } from '../../sheet/rows';
import { placeOf } from '../../sheet/sheet';
import { answersOf, checkKey, nextCheck, questionOf, whereWords } from './check-answers';

const Text = ({
  given,
  onGive,
}: {
  readonly given: string;
  readonly onGive: (text: string) => void;
}) => {
  const [text, setText] = useState(given);
  return (
    <form
      className="actions"
      onSubmit={(event) => {
        event.preventDefault();
        if (text.trim() !== '') onGive(text.trim());
      }}
    >
      <input
        className="input flex-1"
        aria-label="As found"
        value={text}
        maxLength={200}
        onChange={(event) => setText(event.target.value)}
      />
      <button className="btn" type="submit">
        Keep
      </button>
    </form>
  );
};

const positionFor = ({ positions, position }: Bay, key: string): BorePosition =>
  positions.find((one) => boreName(one) === key) ??
  positions.find((one) => String(one.cylinder) === key) ??
  position;

/** The checks without numbers: for this bore, and once for the whole engine. Keys 1, 2, 3 answer. */
export const ChecksPanel = ({
  bay,
  hands,
  listens,
}: {
  readonly bay: Bay;
  readonly hands: Hands;
  readonly listens: boolean;
}) => {
  const { sheet, position, checks, assessment } = bay;
  const bore = boreName(position);
  const here = checks.filter(
    (one) =>
      [bore, 'engine', 'car'].includes(one.position) || one.position === String(position.cylinder),
  );
  // Answered at this tablet, though it may not have gone round yet.
  const [given, setGiven] = useState<ReadonlySet<string>>(new Set());
  // Until this tablet has answered it a check stays under the keys, whoever else answers it meanwhile.
  const [held, hold] = useState<string>();
  const kept = here.find((one) => held === `${bore} ${checkKey(one)}` && !given.has(checkKey(one)));
  const current = kept ?? nextCheck(bay, bore, given);
  const shown = current === undefined || here.includes(current) ? here : [...here, current];
  const holds = current && `${bore} ${checkKey(current)}`;
  useEffect(() => hold(holds), [holds]);
  const declaredOf = ({ subject, position: at }: CheckAsk) =>
    assessment.facts.declared && findAnswer(assessment.facts.declared, subject, at);
  const busy = useRef(false);
  const give = async ({ clause, subject, position: at }: CheckAsk, value: string) => {
    const check = clause.requirement;
    if (check === undefined || !('per' in check)) return false;
    const per = check.per === 'lifter' ? 'bore' : check.per;
    const there = positionFor(bay, at);
    const key = checkKey({ clause, subject, position: at, answer: value });
    setGiven((before) => new Set([...before, key]));
    const done = await hands.record([checkRow(placeOf(there, per), subject, value)]);
    if (!done) setGiven((before) => new Set([...before].filter((one) => one !== key)));
    return done;
  };
  /** A key answers the check that comes first, and goes on to where the next one is. */
  const answer = async (ask: CheckAsk, value: string) => {
    busy.current = true;
    if (!(await give(ask, value))) {
      busy.current = false;
      return;
    }
    const rest = checks.filter(
      (one) => one !== ask && one.answer === undefined && !given.has(checkKey(one)),
    );
    const more = rest.some((one) => one.position === bore || one.position === 'engine');
    const [next] = rest;
    if (!more && next !== undefined) hands.go({ bore: boreName(positionFor(bay, next.position)) });
  };
  // A key that is pressed before the answer is seen would answer the same check again.
  useEffect(() => {
    if (current !== undefined) busy.current = false;
  }, [current]);

  useEffect(() => {
    if (!listens || current?.clause.requirement === undefined) return;
    const answers = answersOf(current.clause.requirement, declaredOf(current));
    const onKeyDown = (event: KeyboardEvent) => {
      const key = padKeyOf(event);
      const chosen = answers[Number(key) - 1];
      if (key === undefined || chosen === undefined || event.repeat || busy.current) return;
      if (event.defaultPrevented || !padMayTake(event.target, key)) return;
      event.preventDefault();
      void answer(current, chosen.value);
    };
    window.addEventListener('keydown', onKeyDown);
    return () => window.removeEventListener('keydown', onKeyDown);
  });

  return (
    <div className="grid gap-5">
      <h2>Checks at {bore}, and for the engine</h2>
      {shown.map((ask) => {
        const check = ask.clause.requirement;
        if (check === undefined) return null;
        const answers = answersOf(check, declaredOf(ask));
        const isCurrent = ask === current;
        return (
          <fieldset
            key={`${ask.clause.number} ${ask.position}`}
            className={isCurrent ? 'check-now' : undefined}
          >
            <legend>
              <span className="finding-clause">{ask.clause.number}</span> {questionOf(check)}{' '}
              <span className="note">{whereWords(ask)}</span>
            </legend>
            <div className="actions">
              {answers.map(({ value, label }, at) => (
                <button
                  key={value}
                  type="button"
                  className={ask.answer === value ? 'btn btn-primary btn-compact' : 'btn'}
                  aria-pressed={ask.answer === value}
                  onClick={() => void give(ask, value)}
                >
                  {label}
                  {isCurrent && <small aria-hidden="true">key {at + 1}</small>}
                </button>
              ))}
            </div>
            {check.kind === 'matches-paperwork' && (
              <Text
                key={ask.answer ?? ''}
                given={ask.answer ?? ''}
                onGive={(text) => void give(ask, text)}
              />
            )}
          </fieldset>
        );
      })}
      {here.length === 0 && <p>The rules of {sheet.rules.className} ask no check here.</p>}
    </div>
  );
};
