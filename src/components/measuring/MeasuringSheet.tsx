import { useCallback, useMemo, useRef, useState } from 'react';
import { SavedLine } from '@/components/look/SavedLine';
import { Keypad } from '@/components/tappet/Keypad';
import { MeasuringLayout, TurningBoreMap } from '@/components/tappet/MeasuringLayout';
import { Tally } from '@/components/tappet/Tally';
import type { SentRow } from '@/contracts/inspection/rows';
import type { InspectionAssessment } from '@/domain/inspection/assess-inspection';
import type { Hands } from './bay';
import { beginSecond, endSecond } from './go-second';
import { lastHeard, whoseFrom } from './live/heard';
import { useLive } from './live/use-live';
import { PadActs } from './panels/pad/PadActs';
import { PanelBeside } from './panels/pad/PanelBeside';
import type { PadPanel } from './panels/pad/panel-beside-props';
import { RackPanel } from './panels/pad/RackPanel';
import { RunPanel } from './panels/RunPanel';
import { WorkPanel } from './panels/work/WorkPanel';
import { assessSheet } from './sheet/assess-sheet';
import { impliedOf } from './sheet/keys/typed-base';
import { factsOf, hintOf, statesOf } from './sheet/on-screen';
import type { Cursor, Sheet } from './sheet/sheet';
import { useBay } from './use-bay';
import { useCapture } from './use-capture';
import { useEntry } from './use-entry';
import { usePlace } from './use-place';

/** The measuring screen: every key goes here, every act to the device first. */
export const MeasuringSheet = ({ sheet: page }: { readonly sheet: Sheet }) => {
  const place = usePlace(page, 'lifter-body-diameter');
  const { cursor, setUp, isRead, go, goAndKeep, keepAfter, setUpAs } = place;
  const latest = useRef<InspectionAssessment>(undefined);
  const { sheet, link, onKept } = useLive(page);
  const capture = useCapture(page, {
    known: sheet.rows,
    tablet: () => assessSheet.told(latest.current),
    onKept,
  });
  const [panel, setPanel] = useState<PadPanel>();
  const [trouble, setTrouble] = useState<string>();
  const whose = useMemo(
    () => whoseFrom(sheet, page.rows, capture.own),
    [sheet, page.rows, capture.own],
  );
  const bay = useBay(sheet, cursor, setUp, capture.rows, whose);
  // Half of a bore's readings would be assessed: the server's own word is enough then.
  latest.current = bay?.blind === true || sheet.second !== undefined ? undefined : bay?.assessment;

  const { record: keep } = capture;
  const record = useCallback(
    async (sent: readonly SentRow[], to?: Partial<Cursor>) => {
      try {
        await (to === undefined ? keep(sent) : keepAfter(to, (after) => keep(sent, after)));
        setTrouble(undefined);
        return true;
      } catch {
        setTrouble('This device did not keep it: its storage is closed or full. Try once more.');
        return false;
      }
    },
    [keep, keepAfter],
  );
  const entry = useEntry(bay, { go, setUpAs, record });
  const { take, clear } = entry;
  const goAfterKeys = useCallback<Hands['go']>(
    (to) =>
      take(() => {
        go(to);
        // Digits belong to the place and the number that they were begun for.
        if (to.part !== undefined || to.zero !== undefined || to.bore !== undefined) clear();
      }),
    [take, go, clear],
  );
  const hands: Hands = { go: goAfterKeys, setUpAs, record };
  if (bay === undefined) return <p>This engine’s position map has no bores.</p>;

  const { part, scale, base, step } = bay;
  const states = statesOf(bay);
  const listens = capture.ready && isRead && panel === undefined;
  const select = (bore: string) => {
    take(() => {
      const { second } = sheet;
      const set = second?.bores.includes(bore) ? second.set : 1;
      go({ bore, cell: undefined, set, zero: undefined, closed: undefined });
      clear();
    });
  };
  const both = async () => {
    if (!(await endSecond(sheet.second !== undefined, goAndKeep)))
      setTrouble('Both sets are shown when there is signal again.');
  };
  const hint = hintOf(step);
  const unsent =
    capture.waiting > 0
      ? `${capture.waiting} ${capture.waiting === 1 ? 'entry' : 'entries'} not sent yet`
      : link === 'asking'
        ? 'Other tablets: asked every 10 s'
        : undefined;
  const heard = lastHeard(bay.rows, bay.judged, page.rows, whose);
  const implied =
    base === undefined
      ? `${scale?.decimals ?? 0} ${scale?.decimals === 1 ? 'decimal' : 'decimals'} implied`
      : `${impliedOf(base)}‥ implied, or all digits`;
  const keypad = part !== undefined && panel === undefined;
  return (
    <MeasuringLayout
      carNumber={sheet.carNumber}
      hand={setUp.hand}
      ready={capture.ready && isRead}
      facts={factsOf(bay, heard)}
      saved={
        <SavedLine
          state={capture.saved.state}
          at={capture.saved.at}
          {...(unsent === undefined ? {} : { unsent })}
        />
      }
      map={
        <TurningBoreMap
          layout={sheet.layout}
          bores={states.bores}
          {...(states.unit === '' ? {} : { unit: states.unit })}
          unitAloud={states.unit === '0.001 in' ? 'thousandths' : states.unit}
          current={cursor.bore}
          onSelect={select}
        />
      }
      tally={
        cursor.part === 'rack' ? null : (
          <Tally statuses={Object.values(states.bores).map((one) => one.status)} />
        )
      }
      run={<RunPanel bay={bay} onClosing={() => hands.go({ zero: 'closing' })} />}
      work={
        <WorkPanel
          bay={bay}
          hands={hands}
          typed={entry.typed}
          problem={entry.problem ?? trouble}
          capture={capture}
          listens={listens}
          onRedo={(runId) => void entry.redo(runId)}
          onBoth={() => void both()}
        />
      }
      pad={
        keypad ? (
          <Keypad
            onKey={take}
            unit={scale?.shown ?? ''}
            unitNote={implied}
            {...(hint === undefined ? {} : { enterHint: hint })}
            listens={listens}
            more={
              <button className="btn" type="button" onClick={() => setPanel('more')}>
                More
              </button>
            }
            acts={
              <PadActs
                bay={bay}
                capture={capture}
                onStrike={() => setPanel('strike')}
                onProblem={setTrouble}
              />
            }
          />
        ) : panel === undefined && cursor.part === 'rack' ? (
          <RackPanel
            key={cursor.bore}
            bay={bay}
            hands={hands}
            listens={listens}
            onMore={() => setPanel('more')}
          />
        ) : (
          <PanelBeside
            key={[panel, cursor.bore, cursor.part, cursor.set].join(' ')}
            panel={panel ?? 'more'}
            bay={bay}
            hands={hands}
            open={setPanel}
            onSecond={(asked) => void beginSecond(asked, part?.key, goAndKeep)}
            onRedo={(runId) => void entry.redo(runId)}
            closable={part !== undefined || cursor.part === 'rack'}
          />
        )
      }
    />
  );
};
