import { useCallback, useRef, useState } from 'react';
import { SavedLine } from '@/components/look/SavedLine';
import { Keypad } from '@/components/tappet/Keypad';
import { MeasuringLayout, TurningBoreMap } from '@/components/tappet/MeasuringLayout';
import { Tally } from '@/components/tappet/Tally';
import type { SentRow } from '@/contracts/inspection/rows';
import type { InspectionAssessment } from '@/domain/inspection/assess-inspection';
import { boreName } from '@/domain/tappet/layout/bore-layout';
import type { Bay, Hands } from './bay';
import { beginSecond, endSecond } from './go-second';
import { PadActs } from './panels/pad/PadActs';
import { type PadPanel, PanelBeside } from './panels/pad/PanelBeside';
import { RackPanel } from './panels/pad/RackPanel';
import { RunPanel } from './panels/RunPanel';
import { WorkPanel } from './panels/work/WorkPanel';
import { assessSheet } from './sheet/assess-sheet';
import { boreStates, checkStates, rackStates } from './sheet/bore-states';
import type { Step } from './sheet/flow/steps';
import { impliedOf } from './sheet/keys/typed-base';
import type { Sheet } from './sheet/sheet';
import { useBay } from './use-bay';
import { useCapture } from './use-capture';
import { useEntry } from './use-entry';
import { usePlace } from './use-place';

/** What Enter does now, under its word. */
const hintOf = (step: Step | undefined): string | undefined => {
  switch (step?.kind) {
    case 'bore':
      return `on to ${boreName(step.to)}`;
    case 'part':
      return `on to ${step.part.label.toLowerCase()}, ${boreName(step.to)}`;
    case 'checks':
      return 'on to the checks';
    case 'opening':
      return 'opening zero';
    case 'closing':
      return 'closing zero';
    case 'closed':
      return 'zero seen';
    default:
      return undefined;
  }
};

const statesOf = (bay: Bay) => {
  const { part, positions, checks, assessment, outOfReach, rack, cursor } = bay;
  if (part !== undefined) return boreStates({ ...bay, part });
  return cursor.part === 'rack'
    ? rackStates(rack)
    : checkStates(positions, checks, assessment, outOfReach);
};

const factsOf = ({ sheet, gauge }: Bay) => [
  { name: 'Engine', value: sheet.engine },
  { name: 'Bay', value: sheet.bay || '–' },
  { name: 'Inspector', value: sheet.inspector, minor: true },
  ...(gauge === undefined
    ? []
    : [
        {
          name: `${gauge.name} ${gauge.code}`,
          value: gauge.dueOn === undefined ? 'No calibration' : `Calibrated to ${gauge.dueOn}`,
        },
      ]),
];

/** The measuring screen: every key goes here, every act to the device first. */
export const MeasuringSheet = ({ sheet }: { readonly sheet: Sheet }) => {
  const { cursor, setUp, isRead, go, goAndKeep, setUpAs } = usePlace(sheet, 'lifter-body-diameter');
  const latest = useRef<InspectionAssessment>(undefined);
  const capture = useCapture(sheet, () => assessSheet.told(latest.current));
  const [panel, setPanel] = useState<PadPanel>();
  const [trouble, setTrouble] = useState<string>();
  const bay = useBay(sheet, cursor, setUp, capture.rows);
  // Half of a bore's readings would be assessed: the server's own word is enough then.
  latest.current = bay?.blind === true || sheet.second !== undefined ? undefined : bay?.assessment;

  const { record: keep } = capture;
  const record = useCallback(
    async (sent: readonly SentRow[]) => {
      try {
        await keep(sent);
        setTrouble(undefined);
        return true;
      } catch {
        setTrouble('This device did not keep it: its storage is closed or full. Try once more.');
        return false;
      }
    },
    [keep],
  );
  const entry = useEntry(bay, { go, setUpAs, record });
  const { take } = entry;
  const goAfterKeys = useCallback<Hands['go']>((to) => take(() => go(to)), [take, go]);
  const hands: Hands = { go: goAfterKeys, setUpAs, record };
  if (bay === undefined) return <p>This engine’s position map has no bores.</p>;

  const { part, scale, base, step } = bay;
  const states = statesOf(bay);
  const listens = capture.ready && isRead && panel === undefined;
  const select = (bore: string) => {
    take(() => {
      go({ bore, cell: undefined, set: 1, zero: undefined, closed: undefined });
      entry.clear();
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
      : undefined;
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
      facts={factsOf(bay)}
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
            acts={
              <PadActs
                bay={bay}
                capture={capture}
                onStrike={() => setPanel('strike')}
                onMore={() => setPanel('more')}
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
            panel={panel ?? 'more'}
            bay={bay}
            hands={hands}
            open={setPanel}
            onSecond={() => void beginSecond(cursor.bore, part?.key, goAndKeep)}
            onRedo={(runId) => void entry.redo(runId)}
            closable={part !== undefined || cursor.part === 'rack'}
          />
        )
      }
    />
  );
};
