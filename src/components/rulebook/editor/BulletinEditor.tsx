import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useDeferredValue, useMemo, useState } from 'react';
import { findBulletinFaults } from '@/domain/rulebook/ambiguity/bulletin-faults';
import type { ClauseChange } from '@/domain/rulebook/bulletin';
import type { Clause } from '@/domain/rulebook/clause';
import type { PenaltyRow } from '@/domain/rulebook/edition';
import { BulletinHead } from './bulletin/BulletinHead';
import { ChangeItem } from './bulletin/ChangeItem';
import { NewChange } from './bulletin/NewChange';
import { FaultList, type PlacedFault } from './clause/FaultList';
import { useGoTo } from './fields/use-go-to';
import { ConflictChoice } from './saving/ConflictChoice';
import { DraftSaved } from './saving/DraftSaved';
import { type BulletinContent, bulletinFrom, bulletinParts, type Titled } from './saving/parts';
import { useAutosave } from './saving/use-autosave';

interface BulletinEditorProps {
  readonly draft: Titled<BulletinContent> & {
    readonly id: string;
    readonly version: number;
    readonly updatedAt: string;
  };
  /** The rules that it amends. */
  readonly rules: {
    readonly clauses: readonly Clause[];
    readonly penalties: readonly PenaltyRow[];
  };
  readonly zone: string;
  readonly publishHref: string;
}

export const numberOf = (change: ClauseChange): string =>
  change.kind === 'withdraw' ? change.number : change.clause.number;

const place = (content: BulletinContent, pointer: string, detail: string): PlacedFault => {
  const [, kind = '', index = ''] = pointer.split('/');
  const change = kind === 'changes' ? content.changes[Number(index)] : undefined;
  if (index === '' || change === undefined) {
    return { key: undefined, place: '', pointer, detail };
  }
  const within = pointer.replace(/^\/changes\/\d+(\/clause)?/, '');
  return { key: index, place: numberOf(change), pointer: within, detail };
};

const Editor = ({ draft, rules, zone, publishHref }: BulletinEditorProps) => {
  const [content, setContent] = useState(draft.content);
  const [open, setOpen] = useState<number>();
  const goTo = useGoTo();
  const written = useMemo(
    () => ({ kind: 'bulletin' as const, title: content.title, content }),
    [content],
  );
  const saving = useAutosave(
    draft.id,
    { version: draft.version, savedAt: draft.updatedAt },
    written,
  );

  const later = useDeferredValue(content);
  const faults = useMemo(
    () =>
      findBulletinFaults(later, rules, new Date().toISOString()).map(({ pointer, detail }) =>
        place(later, pointer, detail),
      ),
    [later, rules],
  );

  const { changes } = content;
  // A change keeps its place; the number in it may be typed over.
  const places = changes.map((change, index) => `${change.kind} ${index + 1}`);
  const setChanges = (next: readonly ClauseChange[]) => setContent({ ...content, changes: next });
  const rowNames = rules.penalties.map((row) => row.row);

  if (saving.state.kind === 'newer') {
    const { newer } = saving.state;
    return (
      <ConflictChoice
        by={newer.updatedBy}
        base={bulletinParts(saving.base as Titled<BulletinContent>)}
        mine={bulletinParts(written)}
        theirs={bulletinParts(newer as unknown as Titled<BulletinContent>)}
        onDecided={(parts) => {
          saving.goOnFrom(newer);
          setOpen(undefined);
          setContent(bulletinFrom(parts).content);
        }}
      />
    );
  }

  return (
    <div className="rulebook-editor">
      <aside>
        <DraftSaved state={saving.state} now={new Date().toISOString()} />
        <FaultList
          faults={faults}
          sound="Next: see which accepted engines it would make illegal."
          onGo={(fault) => {
            setOpen(fault.key === undefined ? undefined : Number(fault.key));
            goTo(fault.pointer);
          }}
        />
        <p className="actions">
          <a className="btn btn-primary" href={publishHref}>
            Check before publishing
          </a>
        </p>
      </aside>
      <div>
        <BulletinHead content={content} zone={zone} faults={faults} onChange={setContent} />
        <section className="stack">
          <div className="section-head ruled">
            <h2>Changes</h2>
          </div>
          <ol className="clause-list">
            {changes.map((change, index) => (
              <ChangeItem
                key={places[index]}
                change={change}
                before={rules.clauses.find((clause) => clause.number === numberOf(change))}
                faults={faults.filter((fault) => fault.key === String(index))}
                open={open === index}
                penaltyRows={rowNames}
                onOpen={() => setOpen(open === index ? undefined : index)}
                onChange={(next) => setChanges(changes.with(index, next))}
                onRemove={() => {
                  setOpen(undefined);
                  setChanges(changes.toSpliced(index, 1));
                }}
              />
            ))}
          </ol>
          <NewChange
            clauses={rules.clauses}
            changes={changes}
            onAdd={(change) => {
              setOpen(changes.length);
              setChanges([...changes, change]);
            }}
          />
        </section>
      </div>
    </div>
  );
};

const queries = new QueryClient();

/** Writes a bulletin's draft onto the rules that it amends. */
export const BulletinEditor = (props: BulletinEditorProps) => (
  <QueryClientProvider client={queries}>
    <Editor {...props} />
  </QueryClientProvider>
);
