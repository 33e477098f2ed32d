import { useState } from 'react';
import type { SentRemark } from '@/contracts/inspection/rows';
import type { Witness } from '@/domain/inspection/report';
import { uuidV7 } from '../measuring/queue/uuid-v7';

interface WitnessWordProps {
  readonly witness: Witness;
  readonly name: string;
  readonly open: boolean;
  readonly record: (row: SentRemark) => Promise<void>;
}

const OUTCOME = {
  signed: 'has seen the findings and signed',
  refused: 'has seen the findings and refused to sign',
  absent: '',
} as const;

/** The competitor's side says that it has seen the findings, or is recorded as refusing to. */
export const WitnessWord = ({ witness, name, open, record }: WitnessWordProps) => {
  const [who, setWho] = useState(witness.name === '' ? name : witness.name);
  const [remark, setRemark] = useState('');
  const [problem, setProblem] = useState<string>();
  const say = async (value: 'signed' | 'refused') => {
    if (who.trim() === '') return setProblem('Name who stands here for the competitor.');
    try {
      await record({
        kind: 'remark',
        remark: 'witness',
        id: uuidV7(),
        occurredAt: new Date().toISOString(),
        place: { bank: '', cylinder: '', valve: '' },
        subject: who.trim(),
        value,
        reason: remark.trim(),
      });
      setProblem(undefined);
    } catch {
      setProblem('This device did not keep it: its storage is closed or full. Sign on paper.');
    }
  };
  return (
    <div className="stack">
      {witness.outcome !== 'absent' && (
        <p className="lead" role="status">
          <strong>{witness.name}</strong> {OUTCOME[witness.outcome]}.
          {witness.remark !== undefined && ` “${witness.remark}”`}
        </p>
      )}
      {open && (
        <>
          {problem !== undefined && (
            <p className="field-error" id="who-error" role="alert">
              {problem}
            </p>
          )}
          <div className="field">
            <label htmlFor="who">Your name</label>
            <input
              id="who"
              maxLength={120}
              autoComplete="off"
              value={who}
              aria-invalid={problem === undefined ? undefined : true}
              aria-describedby={problem === undefined ? undefined : 'who-error'}
              onChange={(e) => setWho(e.target.value)}
            />
          </div>
          <div className="field">
            <label htmlFor="said">What you want written down</label>
            <input
              id="said"
              maxLength={500}
              value={remark}
              onChange={(e) => setRemark(e.target.value)}
            />
          </div>
          <p className="note">
            Your word says that you have seen this, not that you agree. Refusing is recorded as
            such; the inspection goes on either way.
          </p>
          <p className="actions">
            <button className="btn btn-primary" type="button" onClick={() => void say('signed')}>
              I have seen the findings
            </button>
            <button className="btn" type="button" onClick={() => void say('refused')}>
              Refuses to sign
            </button>
          </p>
        </>
      )}
    </div>
  );
};
