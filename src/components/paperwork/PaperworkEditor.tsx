import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useDeferredValue, useEffect, useMemo, useState } from 'react';
import type { Need } from '@/domain/access/paperwork-access';
import { declare, type PaperworkFile } from '@/domain/paperwork/declare';
import { declaredFacts } from '@/domain/paperwork/declared-facts';
import { withReply } from '@/domain/paperwork/draft';
import { openRemarks } from '@/domain/paperwork/open-remarks';
import { NOT_AN_APPROVAL } from '@/domain/paperwork/state';
import {
  isAskedByName,
  isComplete,
  missingWords,
  stillMissing,
} from '@/domain/paperwork/still-missing';
import { withUsualUncertainty } from '@/domain/paperwork/usual-uncertainty';
import { evaluateRules } from '@/domain/rulebook/evaluate/evaluate-rules';
import { CheckList } from './checks/CheckList';
import { LastFoundList } from './checks/LastFoundList';
import { ChooseFields } from './draft/ChooseFields';
import { useDraft } from './draft/use-draft';
import { Photographs } from './files/Photographs';
import { useFiles } from './files/use-files';
import { HandInBar } from './HandInBar';
import type { PaperworkProps } from './paperwork-props';
import { Questions } from './questions/Questions';
import { RemarksOn } from './remarks/RemarksOn';
import { type Replies, RepliesContext } from './remarks/replies';
import { BuildSheet } from './sheet/BuildSheet';

const Editor = (props: PaperworkProps) => {
  const { paperworkId, rules, form, layout, remarks, returned, rights, carNumber, engineId } =
    props;
  const writing = useDraft(props);
  const { draft, change } = writing;
  const files = useFiles(paperworkId, props.files);
  const settled = useDeferredValue(draft);
  const kept = useMemo(
    () => files.files.filter((file) => file.state === 'kept') as readonly PaperworkFile[],
    [files.files],
  );
  const facts = useMemo(
    () => declaredFacts(declare(settled, form, layout, kept), rules),
    [settled, form, layout, kept, rules],
  );
  const results = useMemo(
    () => evaluateRules(rules, withUsualUncertainty(facts), { carNumber, engineId }),
    [rules, facts, carNumber, engineId],
  );
  const open = useMemo(
    () =>
      returned === undefined
        ? []
        : openRemarks(remarks, returned, { ...settled, ...declare(settled, form, layout, kept) }),
    [remarks, returned, settled, form, layout, kept],
  );
  const missing = stillMissing(draft, rules, form, layout, kept, open);
  const replies = useMemo<Replies>(
    () => ({
      given: draft.replies ?? [],
      open: open.map(({ item }) => item),
      onReply: (reply) => change((before) => withReply(before, reply)),
    }),
    [draft.replies, open, change],
  );
  const writes = (right: Need) => rights.includes(right);
  const underWay = files.sending.filter((one) => one.failed === undefined).length;
  const [ready, setReady] = useState(false);
  useEffect(() => setReady(true), []);
  return (
    <RepliesContext value={replies}>
      <div className="stack-lg" data-ready={ready ? 'yes' : 'no'}>
        {writing.overtaken !== undefined && (
          <ChooseFields two={writing.overtaken} form={form} onSettle={writing.settle} />
        )}
        {writing.joined && writing.overtaken === undefined && (
          <p>What another device wrote meanwhile is in here too.</p>
        )}
        {(!writes('answers') || !writes('sheets')) && (
          <p>
            {writes('sheets')
              ? 'You write the measurement sheets here; the rest is for the competitor.'
              : 'The measurement sheets are for the competitor; you write the rest.'}
          </p>
        )}
        <fieldset className="contents" disabled={!writes('answers')}>
          <div className="stack-lg">
            <RemarksOn remarks={remarks} item="general" />
            <Questions
              questions={form.questions}
              draft={draft}
              layout={layout}
              remarks={remarks}
              onChange={change}
            />
            {form.photographs.length > 0 && (
              <Photographs shots={form.photographs} files={files} remarks={remarks} />
            )}
          </div>
        </fieldset>
        <fieldset className="contents" disabled={!writes('sheets')}>
          <div className="stack-lg">
            {form.sheets.map((sheet) => (
              <BuildSheet
                key={sheet.subject}
                paperworkId={paperworkId}
                form={sheet}
                required={isAskedByName(rules, sheet)}
                layout={layout}
                draft={draft}
                files={files}
                rules={rules}
                results={results}
                remarks={remarks}
                onChange={change}
              />
            ))}
          </div>
        </fieldset>
        <fieldset className="contents" disabled={!writes('answers')}>
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
        </fieldset>
        <section aria-labelledby="check">
          <div className="section-head ruled">
            <h2 id="check">Check against the rules</h2>
          </div>
          <CheckList results={results} rules={rules} facts={facts} />
          {props.lastFound && <LastFoundList last={props.lastFound} facts={facts} />}
          <p className="mt-3">{NOT_AN_APPROVAL}</p>
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
    </RepliesContext>
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
