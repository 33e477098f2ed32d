import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useCallback, useDeferredValue, useMemo, useReducer } from 'react';
import { findAmbiguities } from '@/domain/rulebook/ambiguity/find-ambiguities';
import { FaultList, type PlacedFault } from './clause/FaultList';
import { ClauseList } from './edition/ClauseList';
import { draftState, PENALTIES, reduceDraft } from './edition/draft-state';
import { PenaltySection } from './edition/PenaltySection';
import { byRow, faultsOf, placeFaults } from './edition/place-faults';
import { useGoTo } from './fields/use-go-to';
import { ConflictChoice } from './saving/ConflictChoice';
import { DraftSaved } from './saving/DraftSaved';
import { type EditionContent, editionFrom, editionParts, type Titled } from './saving/parts';
import { useAutosave } from './saving/use-autosave';

interface DraftEditorProps {
  readonly draft: Titled<EditionContent> & {
    readonly id: string;
    readonly version: number;
    readonly updatedAt: string;
  };
  readonly publishHref: string;
}

const Editor = ({ draft, publishHref }: DraftEditorProps) => {
  const [state, act] = useReducer(reduceDraft, draft, draftState);
  const goTo = useGoTo();
  const { title, rows, penalties } = state;

  const written = useMemo(() => {
    const content: EditionContent = { clauses: rows.map((row) => row.clause), penalties };
    return { kind: 'edition' as const, title, content };
  }, [title, rows, penalties]);
  const saving = useAutosave(
    draft.id,
    { version: draft.version, savedAt: draft.updatedAt },
    written,
  );

  // What is ambiguous may be said a moment after the key was seen.
  const later = useDeferredValue(written.content);
  const laterRows = useDeferredValue(rows);
  const faults = useMemo(
    () => placeFaults(laterRows, findAmbiguities(later.clauses, later.penalties)),
    [laterRows, later],
  );
  const placed = useMemo(() => byRow(faults), [faults]);
  const rowNames = useMemo(() => penalties.map((row) => row.row), [penalties]);

  const openRow = useCallback(
    (key: string) => {
      act({ do: 'open', key });
      goTo('/heading');
    },
    [goTo],
  );
  const go = useCallback(
    (fault: PlacedFault) => {
      act({ do: 'open', key: fault.key });
      goTo(fault.pointer);
    },
    [goTo],
  );

  if (saving.state.kind === 'newer') {
    const { newer } = saving.state;
    return (
      <ConflictChoice
        by={newer.updatedBy}
        base={editionParts(saving.base as Titled<EditionContent>)}
        mine={editionParts(written)}
        theirs={editionParts(newer as unknown as Titled<EditionContent>)}
        onDecided={(parts) => {
          saving.goOnFrom(newer);
          act({ do: 'take', draft: editionFrom(parts) });
        }}
      />
    );
  }

  return (
    <div className="rulebook-editor">
      <aside>
        <DraftSaved state={saving.state} now={new Date().toISOString()} />
        <FaultList faults={faults} sound="It can be published." onGo={go} />
        <p className="actions">
          <a className="btn btn-primary" href={publishHref}>
            Check before publishing
          </a>
        </p>
      </aside>
      <div>
        <div className="field">
          <label htmlFor="draft-title">Title of this edition</label>
          <input
            id="draft-title"
            type="text"
            maxLength={200}
            value={title}
            onChange={(event) => act({ do: 'title', title: event.target.value })}
          />
        </div>
        <ClauseList
          state={state}
          faults={placed}
          penaltyRows={rowNames}
          act={act}
          onOpen={openRow}
        />
        <PenaltySection state={state} faults={faultsOf(placed, PENALTIES)} act={act} />
      </div>
    </div>
  );
};

const queries = new QueryClient();

/** Writes an edition's draft: one clause open as a form at a time, kept as it is written. */
export const DraftEditor = (props: DraftEditorProps) => (
  <QueryClientProvider client={queries}>
    <Editor {...props} />
  </QueryClientProvider>
);
