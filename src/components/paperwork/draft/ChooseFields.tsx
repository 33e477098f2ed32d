import { useState } from 'react';
import {
  type DraftConflict,
  draftConflicts,
  type Side,
} from '@/domain/paperwork/merge/merge-drafts';
import type { PaperworkForm } from '@/domain/rulebook/form/form';
import { getQuantityEntry } from '@/domain/rulebook/quantity-catalogue';
import { Caution } from '../../look/Caution';
import type { Overtaken } from './use-draft';

interface ChooseFieldsProps {
  readonly two: Overtaken;
  readonly form: PaperworkForm;
  readonly onSettle: (two: Overtaken, chosen: ReadonlyMap<string, Side>) => void;
}

const nameOf = ({ field }: DraftConflict, form: PaperworkForm): string => {
  const question = (subject: string) =>
    form.questions.find((one) => one.subject === subject)?.question;
  if (field.kind === 'answer') return question(field.answer.subject) ?? field.answer.subject;
  if (field.kind === 'cell')
    return `${field.cell.position}, ${getQuantityEntry(field.cell.quantity).label.toLowerCase()}`;
  return field.kind === 'reply'
    ? `Answer to the remark: ${question(field.reply.item) ?? field.reply.item}`
    : 'For the officials';
};

const SIDES: readonly (readonly [Side, string])[] = [
  ['mine', 'On this device'],
  ['theirs', 'On the other device'],
];

/** Where two devices wrote the same field differently: one choice a field, both values in sight. */
export const ChooseFields = ({ two, form, onSettle }: ChooseFieldsProps) => {
  const [chosen, setChosen] = useState<ReadonlyMap<string, Side>>(new Map());
  const conflicts = draftConflicts(two.base, two.mine, two.theirs);
  const left = conflicts.filter(({ key }) => !chosen.has(key)).length;
  return (
    <Caution title="Changed on another device" status="too-close">
      <p>
        {two.base === undefined
          ? 'Choose, field by field, which value goes on.'
          : 'What only one of the devices changed is kept. Choose where both did.'}
      </p>
      {conflicts.map((conflict) => (
        <fieldset key={conflict.key} className="py-2">
          <legend>{nameOf(conflict, form)}</legend>
          {SIDES.map(([side, where]) => (
            <label className="choice" key={side}>
              <input
                type="radio"
                name={conflict.key}
                checked={chosen.get(conflict.key) === side}
                onChange={() => setChosen(new Map(chosen).set(conflict.key, side))}
              />
              <span>
                {where}: <strong>{conflict[side] === '' ? 'nothing' : conflict[side]}</strong>
              </span>
            </label>
          ))}
        </fieldset>
      ))}
      <p className="actions mt-3">
        <button
          type="button"
          className="btn"
          disabled={left > 0}
          onClick={() => onSettle(two, chosen)}
        >
          {left > 0 ? `${left} still to choose` : 'Go on with these'}
        </button>
      </p>
    </Caution>
  );
};
