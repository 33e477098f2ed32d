import { useMemo, useState } from 'react';
import { type Choice, findChoices, joined, type Side } from './join-drafts';
import type { Part } from './parts';

interface ConflictChoiceProps {
  readonly by: string;
  readonly base: readonly Part[];
  readonly mine: readonly Part[];
  readonly theirs: readonly Part[];
  readonly onDecided: (parts: readonly Part[]) => void;
}

const SideWords = ({ part }: { readonly part: Part | undefined }) =>
  part === undefined ? (
    <em>Not there</em>
  ) : (
    part.words.map((words) => (
      <span className="side-words" key={words}>
        {words}
      </span>
    ))
  );

const OneChoice = ({
  choice,
  by,
  picked,
  onPick,
}: {
  readonly choice: Choice;
  readonly by: string;
  readonly picked: Side | undefined;
  readonly onPick: (side: Side) => void;
}) => (
  <fieldset className="conflict">
    <legend>
      {choice.label}
      {choice.suggested === undefined && ': you both changed it'}
      {choice.suggested === 'mine' && ': only you changed it'}
      {choice.suggested === 'theirs' && `: only ${by} changed it`}
    </legend>
    {(['mine', 'theirs'] as const).map((side) => (
      <label className="choice" key={side}>
        <input
          type="radio"
          name={choice.id}
          checked={picked === side}
          onChange={() => onPick(side)}
        />
        <span>
          <strong>{side === 'mine' ? 'Yours' : `${by}’s`}</strong>
          <SideWords part={choice[side]} />
        </span>
      </label>
    ))}
  </fieldset>
);

/** Somebody saved while this was being written: what differs, part by part, and which to keep. */
export const ConflictChoice = ({ by, base, mine, theirs, onDecided }: ConflictChoiceProps) => {
  const choices = useMemo(() => findChoices(base, mine, theirs), [base, mine, theirs]);
  const [chosen, setChosen] = useState<ReadonlyMap<string, Side>>(new Map());
  const picked = new Map(
    choices.flatMap((choice): [string, Side][] => {
      const side = chosen.get(choice.id) ?? choice.suggested;
      return side === undefined ? [] : [[choice.id, side]];
    }),
  );
  const open = choices.length - picked.size;
  return (
    <section className="problems" role="alert" aria-labelledby="conflict-title">
      <h2 id="conflict-title">{by} saved this draft while you were writing</h2>
      <p>Nothing is lost. For each difference, choose which to keep.</p>
      {choices.map((choice) => (
        <OneChoice
          key={choice.id}
          choice={choice}
          by={by}
          picked={picked.get(choice.id)}
          onPick={(side) => setChosen(new Map(chosen).set(choice.id, side))}
        />
      ))}
      <p className="actions">
        <button
          type="button"
          className="btn btn-primary btn-compact"
          disabled={open > 0}
          onClick={() => onDecided(joined(mine, choices, picked))}
        >
          Go on with these
        </button>
        {open > 0 && <span>{open} still to choose</span>}
      </p>
    </section>
  );
};
