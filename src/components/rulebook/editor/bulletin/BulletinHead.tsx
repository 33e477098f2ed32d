import { momentText, readMoment, sameOnTheClock } from '@/contracts/rulebook/moment';
import type { Effective } from '@/domain/rulebook/bulletin';
import type { PlacedFault } from '../clause/FaultList';
import { FaultsHere } from '../fields/faults';
import { SelectField } from '../fields/SelectField';
import { ReadField, TextField } from '../fields/TextField';
import type { BulletinContent } from '../saving/parts';

const WHEN = [
  { value: 'next-event', label: 'From the start of the next event' },
  { value: 'safety', label: 'At once: it is for safety' },
  { value: 'instant', label: 'From a day and time' },
];

interface BulletinHeadProps {
  readonly content: BulletinContent;
  readonly zone: string;
  readonly faults: readonly PlacedFault[];
  readonly onChange: (content: BulletinContent) => void;
}

const effectiveOf = (kind: string): Effective => {
  if (kind === 'safety' || kind === 'next-event') return { kind };
  return { kind: 'instant', at: new Date(Math.ceil(Date.now() / 60_000) * 60_000).toISOString() };
};

const PASSES = ['The first time: before they go back', 'The second time: after they went back'];

interface WhichPassProps {
  readonly at: string;
  readonly zone: string;
  readonly onChange: (at: string) => void;
}

/** In the hour that comes again when clocks are set back, which of the two is meant. */
const WhichPass = ({ at, zone, onChange }: WhichPassProps) => {
  const shown = sameOnTheClock(new Date(at), zone).map((instant) => instant.toISOString());
  if (shown.length < 2) return null;
  const clock = momentText(new Date(at), zone).slice(-5);
  return (
    <SelectField
      at="/effective/pass"
      label={`The clocks show ${clock} twice that night`}
      value={at}
      options={shown.map((instant, index) => ({ value: instant, label: PASSES[index] ?? instant }))}
      onChange={onChange}
    />
  );
};

/** What the bulletin is called, why, and from when it counts. */
export const BulletinHead = ({ content, zone, faults, onChange }: BulletinHeadProps) => {
  const { title, reason, effective } = content;
  const read = (text: string): string | undefined =>
    readMoment(text.replace(' ', 'T'), zone)?.toISOString();
  const from = (at: string) => onChange({ ...content, effective: { kind: 'instant', at } });
  return (
    <FaultsHere.Provider value={faults.filter((fault) => fault.key === undefined)}>
      <TextField
        at="/title"
        label="Title"
        value={title}
        onChange={(next) => onChange({ ...content, title: next })}
      />
      <TextField
        at="/reason"
        label="Reason"
        hint="It is published"
        long
        value={reason}
        onChange={(next) => onChange({ ...content, reason: next })}
      />
      <SelectField
        at="/effective"
        label="It counts"
        value={effective.kind}
        options={WHEN}
        onChange={(kind) => onChange({ ...content, effective: effectiveOf(kind) })}
      />
      {effective.kind === 'instant' && (
        <>
          <ReadField
            at="/effective/at"
            label="From"
            hint={`Day and time in ${zone}, such as 2026-07-01 00:00`}
            value={effective.at}
            show={(at) => momentText(new Date(at), zone).replace('T', ' ')}
            read={read}
            refused="Write a day and a time, such as 2026-07-01 00:00."
            onChange={from}
          />
          <WhichPass at={effective.at} zone={zone} onChange={from} />
        </>
      )}
    </FaultsHere.Provider>
  );
};
