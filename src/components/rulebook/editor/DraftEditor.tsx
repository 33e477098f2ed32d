import { QueryClient, QueryClientProvider } from '@tanstack/react-query';
import { useCallback, useDeferredValue, useEffect, useMemo, useReducer, useState } from 'react';
import { findAmbiguities } from '@/domain/rulebook/ambiguity/find-ambiguities';
import { ClauseForm } from './ClauseForm';
import { ClauseRow } from './ClauseRow';
import { ConflictChoice } from './ConflictChoice';
import { DraftSaved } from './DraftSaved';
import { draftState, PENALTIES, reduceDraft } from './draft-state';
import { FaultList, type PlacedFault } from './FaultList';
import { focusField } from './fields/faults';
import type { Row } from './numbering';
import { PenaltyForm } from './PenaltyForm';
import { type EditionContent, editionFrom, editionParts, type Titled } from './parts';
import { useAutosave } from './use-autosave';

interface DraftEditorProps {
  readonly draft: Titled<EditionContent> & {
    readonly id: string;
    readonly version: number;
    readonly updatedAt: string;
  };
  readonly publishHref: string;
}

const NO_FAULTS: readonly PlacedFault[] = [];

const place = (rows: readonly Row[], faults: ReturnType<typeof findAmbiguities>) =>
  faults.map(({ pointer, detail }): PlacedFault => {
    const [, kind, index = ''] = pointer.split('/');
    if (kind === 'penalties') return { key: PENALTIES, place: 'Penalties', pointer, detail };
    const row = rows[Number(index)];
    const within = pointer.split('/').slice(3).join('/');
    return index === '' || row === undefined
      ? { key: undefined, place: '', pointer, detail }
      : { key: row.key, place: row.clause.number, pointer: `/${within}`, detail };
  });

const grouped = (faults: readonly PlacedFault[]) => {
  const byKey = new Map<string | undefined, PlacedFault[]>();
  for (const fault of faults) byKey.set(fault.key, [...(byKey.get(fault.key) ?? []), fault]);
  return byKey;
};

const Editor = ({ draft, publishHref }: DraftEditorProps) => {
  const [state, act] = useReducer(reduceDraft, draft, draftState);
  const [find, setFind] = useState('');
  const [goTo, setGoTo] = useState<string>();
  const { title, rows, penalties, open, removed } = state;

  const written = useMemo(() => {
    const content: EditionContent = { clauses: rows.map((row) => row.clause), penalties };
    return { kind: 'edition' as const, title, content };
  }, [title, rows, penalties]);
  const saving = useAutosave(
    draft.id,
    { version: draft.version, savedAt: draft.updatedAt },
    written,
  );

  const later = useDeferredValue(state);
  const faults = useMemo(() => {
    const clauses = later.rows.map((row) => row.clause);
    return place(later.rows, findAmbiguities(clauses, later.penalties));
  }, [later.rows, later.penalties]);
  const byKey = useMemo(() => grouped(faults), [faults]);

  useEffect(() => {
    if (goTo === undefined) return;
    focusField(goTo);
    setGoTo(undefined);
  }, [goTo]);

  const openRow = useCallback((key: string) => {
    act({ do: 'open', key });
    setGoTo('/heading');
  }, []);
  const go = (fault: PlacedFault) => {
    act({ do: 'open', key: fault.key });
    setFind('');
    setGoTo(fault.pointer);
  };

  const wanted = find.trim().toLowerCase();
  const shown =
    wanted === ''
      ? rows
      : rows.filter(
          ({ key, clause }) =>
            key === open ||
            `${clause.number} ${clause.heading} ${clause.words}`.toLowerCase().includes(wanted),
        );
  const rowNames = useMemo(() => penalties.map((row) => row.row), [penalties]);

  if (saving.state.kind === 'newer') {
    const { newer } = saving.state;
    const theirs = newer as unknown as Titled<EditionContent>;
    return (
      <ConflictChoice
        by={newer.updatedBy}
        base={editionParts(saving.base as Titled<EditionContent>)}
        mine={editionParts(written)}
        theirs={editionParts(theirs)}
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
        <div className="field">
          <label htmlFor="draft-find">Find in {rows.length} clauses</label>
          <input
            id="draft-find"
            type="search"
            value={find}
            onChange={(event) => setFind(event.target.value)}
          />
        </div>
        {removed && (
          <p className="actions" role="status">
            <span>Clause {removed.clause.number} was removed.</span>
            <button type="button" className="btn" onClick={() => act({ do: 'put-back' })}>
              Put it back
            </button>
          </p>
        )}
        <ol className="clause-list">
          {shown.map((row) => {
            const here = byKey.get(row.key) ?? NO_FAULTS;
            if (row.key !== open) {
              return (
                <li key={row.key}>
                  <ClauseRow row={row} faults={here.length} onOpen={openRow} />
                </li>
              );
            }
            const { key, clause } = row;
            return (
              <li key={key} className="clause-open">
                <h3>
                  <span className="num">{clause.number}</span> {clause.heading}
                </h3>
                <ClauseForm
                  clause={clause}
                  faults={here}
                  penaltyRows={rowNames}
                  onChange={(next) => act({ do: 'change', key, clause: next })}
                  onRenumber={(number) => act({ do: 'renumber', key, number })}
                />
                <p className="actions">
                  <button
                    type="button"
                    className="btn"
                    onClick={() => act({ do: 'open', key: undefined })}
                  >
                    Close clause {clause.number}
                  </button>
                  <button
                    type="button"
                    className="btn"
                    onClick={() => act({ do: 'add', where: 'beside', key })}
                  >
                    Add a clause at this level
                  </button>
                  <button
                    type="button"
                    className="btn"
                    onClick={() => act({ do: 'add', where: 'under', key })}
                  >
                    Add a clause below {clause.number}
                  </button>
                  <button type="button" className="btn" onClick={() => act({ do: 'remove', key })}>
                    Remove clause {clause.number}
                  </button>
                </p>
              </li>
            );
          })}
        </ol>
        <p className="actions">
          <button type="button" className="btn" onClick={() => act({ do: 'add', where: 'end' })}>
            Add a clause
          </button>
        </p>
        <section className="penalty-schedule">
          <div className="section-head ruled">
            <h2>Penalty schedule</h2>
            <button
              type="button"
              className="btn"
              aria-expanded={open === PENALTIES}
              onClick={() => act({ do: 'open', key: open === PENALTIES ? undefined : PENALTIES })}
            >
              {open === PENALTIES ? 'Close' : 'Edit the schedule'}
            </button>
          </div>
          {open === PENALTIES ? (
            <PenaltyForm
              penalties={penalties}
              faults={byKey.get(PENALTIES) ?? NO_FAULTS}
              onChange={(next) => act({ do: 'penalties', penalties: next })}
            />
          ) : (
            <dl className="pairs">
              {penalties.map((row) => (
                <div className="contents" key={row.row}>
                  <dt>Row {row.row}</dt>
                  <dd>
                    {row.breach}: {row.penalties.join('; then ')}
                  </dd>
                </div>
              ))}
            </dl>
          )}
        </section>
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
