import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useDeferredValue, useEffect, useMemo, useState } from 'react';
import { declare, type PaperworkFile } from '@/domain/paperwork/declare';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import {
  isAskedByName,
  isComplete,
  missingWords,
  stillMissing,
} from '@/domain/paperwork/still-missing';
import { withUsualUncertainty } from '@/domain/paperwork/usual-uncertainty';
import { evaluateRules } from '@/domain/rulebook/evaluate/evaluate-rules';
import { Caution } from '../look/Caution';
import { CheckList } from './CheckList';
import { useDraft } from './draft/use-draft';
import { useFiles } from './files/use-files';
import { HandInBar } from './HandInBar';
import { Photographs } from './Photographs';
import type { PaperworkProps } from './paperwork-props';
import { Questions } from './Questions';
import { RemarksOn } from './RemarksOn';
import { BuildSheet } from './sheet/BuildSheet';

const Editor = (props: PaperworkProps) => {
  const { paperworkId, rules, form, layout, remarks, carNumber, engineId } = props;
  const writing = useDraft(props);
  const { draft, change } = writing;
  const files = useFiles(paperworkId, props.files);
  const settled = useDeferredValue(draft);
  const kept = useMemo(
    () => files.files.filter((file) => file.state === 'kept') as readonly PaperworkFile[],
    [files.files],
  );
  const facts = useMemo(
    () => declaredFacts(declare(settled, form, layout, kept)),
    [settled, form, layout, kept],
  );
  const results = useMemo(
    () => evaluateRules(rules, withUsualUncertainty(facts), { carNumber, engineId }),
    [rules, facts, carNumber, engineId],
  );
  const missing = stillMissing(draft, rules, form, layout, kept);
  const underWay = files.sending.filter((one) => one.failed === undefined).length;
  const [ready, setReady] = useState(false);
  useEffect(() => setReady(true), []);
  return (
    <div className="stack-lg" data-ready={ready ? 'yes' : 'no'}>
      {writing.older !== undefined && (
        <Caution title="This device holds entries that were never sent" status="too-close">
          <p>A newer draft came from another device meanwhile. Choose which one goes on.</p>
          <p className="actions">
            <button type="button" className="btn" onClick={writing.takeOlder}>
              Use what is on this device
            </button>
            <button type="button" className="btn" onClick={writing.dropOlder}>
              Go on with the newer one
            </button>
          </p>
        </Caution>
      )}
      {writing.conflict && (
        <Caution title="Changed on another device" status="too-close">
          <p>
            Your entries are kept on this device.{' '}
            <a href={`/paddock/paperwork/${paperworkId}`}>Open the newer draft</a>, then choose.
          </p>
        </Caution>
      )}
      <RemarksOn remarks={remarks} item="general" />
      <Questions questions={form.questions} draft={draft} remarks={remarks} onChange={change} />
      {form.photographs.length > 0 && (
        <Photographs shots={form.photographs} files={files} remarks={remarks} />
      )}
      {form.sheets.map((sheet) => (
        <BuildSheet
          key={sheet.subject}
          paperworkId={paperworkId}
          form={sheet}
          required={isAskedByName(rules, sheet)}
          layout={layout}
          draft={draft}
          files={files}
          results={results}
          remarks={remarks}
          onChange={change}
        />
      ))}
      <section aria-labelledby="note">
        <h2 id="note">For the officials</h2>
        <div className="field">
          <label htmlFor="note-text">Anything they should know</label>
          <textarea
            id="note-text"
            maxLength={2000}
            value={draft.note}
            onChange={(event) => change((before) => ({ ...before, note: event.target.value }))}
          />
        </div>
      </section>
      <section aria-labelledby="check">
        <div className="section-head ruled">
          <h2 id="check">Check against the rules</h2>
        </div>
        <CheckList results={results} rules={rules} facts={facts} />
      </section>
      <HandInBar
        paperworkId={paperworkId}
        saved={writing.saved}
        missing={[missingWords(missing), underWay > 0 ? `${underWay} being sent` : '']
          .filter((part) => part !== '')
          .join(', ')}
        ready={isComplete(missing) && underWay === 0}
      />
    </div>
  );
};

/** The paperwork's form: it follows the rules, saves itself, and says at every moment what is missing. */
export const PaperworkEditor = (props: PaperworkProps) => {
  const [client] = useState(() => new QueryClient());
  return (
    <QueryClientProvider client={client}>
      <Editor {...props} />
    </QueryClientProvider>
  );
};
