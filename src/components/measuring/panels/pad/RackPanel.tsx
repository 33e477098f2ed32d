import { useEffect, useState } from 'react';
import { padKeyOf, padMayTake } from '@/components/tappet/keys';
import type { SentRow } from '@/contracts/inspection/rows';
import type { RackedLifter } from '@/domain/inspection/rack/rack';
import { type BorePosition, boreName } from '@/domain/tappet/layout/bore-layout';
import type { Bay, Hands } from '../../bay';
import { lifterInRow, lifterOutRow } from '../../sheet/rows';
import { placeOf } from '../../sheet/sheet';

const stateAt = (rack: readonly RackedLifter[], bore: string) =>
  rack.find(({ lifter }) => lifter === bore)?.state ?? 'in-engine';

/** The bore after this one whose lifter is in the same state: the next to come out, or to go in. */
const nextIn = ({ positions, rack }: Bay, from: string): string | undefined => {
  const at = positions.findIndex((one) => boreName(one) === from);
  const state = stateAt(rack, from);
  return [...positions.slice(at + 1), ...positions.slice(0, at)]
    .map(boreName)
    .find((bore) => stateAt(rack, bore) === state);
};

/** In the keypad's place: the lifter of this bore out of the engine, and in again. Enter does the same. */
export const RackPanel = ({
  bay,
  hands,
  listens,
  onMore,
}: {
  readonly bay: Bay;
  readonly hands: Hands;
  readonly listens: boolean;
  readonly onMore: () => void;
}) => {
  const { position, positions, rack } = bay;
  const [elsewhere, setElsewhere] = useState(false);
  const bore = boreName(position);
  const state = stateAt(rack, bore);
  const place = (one: BorePosition) => placeOf(one, 'bore');
  const say = async (rows: readonly SentRow[], to?: string) => {
    if (!(await hands.record(rows))) return;
    setElsewhere(false);
    if (to !== undefined) hands.go({ bore: to });
  };
  const act = () =>
    state === 'racked'
      ? say([lifterInRow(place(position), bore)], nextIn(bay, bore))
      : say([lifterOutRow(place(position))], nextIn(bay, bore));
  const still = positions.filter((one) => stateAt(rack, boreName(one)) === 'in-engine');
  const racked = positions.filter((one) => stateAt(rack, boreName(one)) === 'racked');

  useEffect(() => {
    if (!listens) return;
    const onKeyDown = (event: KeyboardEvent) => {
      if (padKeyOf(event) !== 'enter' || event.repeat || event.defaultPrevented) return;
      if (!padMayTake(event.target, 'enter')) return;
      event.preventDefault();
      void act();
    };
    window.addEventListener('keydown', onKeyDown);
    return () => window.removeEventListener('keydown', onKeyDown);
  });

  return (
    <section className="flex flex-col gap-3" aria-label="Rack of lifters">
      <h2>Lifter of {bore}</h2>
      {elsewhere ? (
        <>
          <p>It goes into:</p>
          <div className="grid grid-cols-3 gap-2">
            {positions.map((one) => (
              <button
                key={boreName(one)}
                type="button"
                className="btn px-1"
                onClick={() => void say([lifterInRow(place(one), bore)], nextIn(bay, bore))}
              >
                {boreName(one)}
              </button>
            ))}
          </div>
          <button type="button" className="btn" onClick={() => setElsewhere(false)}>
            Back
          </button>
        </>
      ) : (
        <>
          <button type="button" className="btn btn-primary" onClick={() => void act()}>
            {state === 'racked' ? `In again, at ${bore}` : `Out, racked as ${bore}`}
          </button>
          {state === 'racked' && (
            <button type="button" className="btn" onClick={() => setElsewhere(true)}>
              Into another bore
            </button>
          )}
          {still.length > 1 && (
            <button
              type="button"
              className="btn"
              onClick={() => void say(still.map((one) => lifterOutRow(place(one))))}
            >
              All {still.length} out, racked by bore
            </button>
          )}
          {racked.length > 1 && (
            <button
              type="button"
              className="btn"
              onClick={() => void say(racked.map((one) => lifterInRow(place(one), boreName(one))))}
            >
              All {racked.length} in, each at its own bore
            </button>
          )}
          <button type="button" className="btn" onClick={onMore}>
            More
          </button>
        </>
      )}
    </section>
  );
};
