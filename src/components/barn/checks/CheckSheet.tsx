import { QueryClient, QueryClientProvider, useQuery, useQueryClient } from '@tanstack/react-query';
import { useEffect, useState } from 'react';
import type {
  CheckAnswer,
  CheckRequest,
  ChecksShown,
  LineCheckShown,
} from '@/contracts/event/check';
import { get, newId, post, Refusal } from '../../paperwork/api';
import { followBarn } from '../live';
import { CheckRow } from './CheckRow';

interface CheckSheetProps {
  readonly shown: ChecksShown;
}

const keyOf = (check: LineCheckShown) => `${check.classId} ${check.clause}`;

const isBegun = (shown: ChecksShown, { classId, clause }: LineCheckShown) =>
  shown.checked.some(
    (one) =>
      one.clause === clause &&
      shown.cars.some((car) => car.entryId === one.entryId && car.classId === classId),
  );

const Sheet = ({ shown: first }: CheckSheetProps) => {
  const path = `/api/events/${first.seriesId}/${first.eventId}/checks`;
  const client = useQueryClient();
  const { data: shown } = useQuery({
    queryKey: ['checks', first.eventId],
    queryFn: () => get<ChecksShown>(path),
    initialData: first,
    refetchOnWindowFocus: true,
  });
  const readAnew = () => client.invalidateQueries({ queryKey: ['checks', first.eventId] });
  useEffect(() => {
    const again = () => void client.invalidateQueries({ queryKey: ['checks', first.eventId] });
    const end = followBarn(first.seriesId, {
      onNews: (news) => {
        if (news.kind !== 'readings') again();
      },
      onRefresh: again,
    });
    addEventListener('pagehide', end);
    return () => {
      removeEventListener('pagehide', end);
      end();
    };
  }, [client, first.seriesId, first.eventId]);

  const offered = shown.checks.filter((check) => check.usual || isBegun(shown, check));
  const more = shown.checks.filter((check) => !offered.includes(check));
  const [chosen, choose] = useState(() => (offered[0] ? keyOf(offered[0]) : ''));
  const [gaugeId, setGauge] = useState(shown.gauges[0]?.id ?? '');
  const check = shown.checks.find((one) => keyOf(one) === chosen);
  const classes = new Map(shown.cars.map((car) => [car.classId, car.className]));
  const cars = shown.cars.filter((car) => car.classId === check?.classId);
  const done = (one: LineCheckShown) => {
    const ids = shown.cars.filter((car) => car.classId === one.classId).map((car) => car.entryId);
    const count = shown.checked.filter(
      (row) => row.clause === one.clause && ids.includes(row.entryId),
    ).length;
    return `${count} of ${ids.length}`;
  };
  const label = (one: LineCheckShown) =>
    `${classes.size > 1 ? `${classes.get(one.classId) ?? ''} ` : ''}${one.clause} ${one.heading}`;

  const send = async (
    entryId: string,
    said: Pick<CheckRequest, 'answer' | 'value' | 'takeBack' | 'correction' | 'gaugeId'>,
  ): ReturnType<Parameters<typeof CheckRow>[0]['send']> => {
    if (check === undefined) return undefined;
    try {
      const answer = await post<CheckAnswer>(path, {
        act: newId(),
        id: newId(),
        entryId,
        clause: check.clause,
        ...(said.value === undefined ? {} : { gaugeId }),
        ...said,
      });
      void readAnew();
      return answer.state === 'outside' && answer.inspection !== null
        ? { refused: false, words: 'Its inspection is open.' }
        : undefined;
    } catch (error) {
      const words =
        error instanceof Refusal
          ? error.detail
          : 'Not sent: the server was not reached. Tap it again.';
      return { refused: true, words };
    }
  };

  if (shown.checks.length === 0)
    return (
      <p className="lead">
        No clause in force can be checked on a car that stays together: no scale, seal or plug
        gauge.
      </p>
    );
  const tab = (one: LineCheckShown) => (
    <button
      key={keyOf(one)}
      type="button"
      className="btn"
      aria-pressed={keyOf(one) === chosen}
      onClick={() => choose(keyOf(one))}
    >
      {label(one)} <span className="note">{done(one)}</span>
    </button>
  );
  return (
    <div className="stack">
      <fieldset className="actions">
        <legend className="visually-hidden">Which check</legend>
        {offered.map(tab)}
      </fieldset>
      {more.length > 0 && (
        <details>
          <summary>Other clauses that can be checked</summary>
          <div className="actions">{more.map(tab)}</div>
        </details>
      )}
      {check !== undefined && (
        <section aria-label={label(check)}>
          <p>
            <strong>
              {check.clause} {check.heading}.
            </strong>{' '}
            {check.words}
            {check.advisory && ' Advisory: warns, disqualifies nobody.'}
          </p>
          {check.ask.kind === 'value' && (
            <div className="field">
              <label htmlFor="gauge">Read on</label>
              <select id="gauge" value={gaugeId} onChange={(event) => setGauge(event.target.value)}>
                {shown.gauges.length === 0 && <option value="">No scale is in the register</option>}
                {shown.gauges.map((gauge) => (
                  <option key={gauge.id} value={gauge.id}>
                    {gauge.code}, {gauge.name}
                  </option>
                ))}
              </select>
            </div>
          )}
          <ul className="list-rows mt-3">
            {cars.map((car) => (
              <CheckRow
                key={`${chosen} ${car.entryId}`}
                car={car}
                ask={check.ask}
                checked={shown.checked.find(
                  (one) => one.entryId === car.entryId && one.clause === check.clause,
                )}
                records={shown.records}
                gauges={shown.gauges}
                zone={shown.zone}
                send={(said) => send(car.entryId, said)}
              />
            ))}
          </ul>
        </section>
      )}
    </div>
  );
};

/** All cars of an event, one check after the other, as they roll over the scale and down the line. */
export const CheckSheet = ({ shown }: CheckSheetProps) => {
  const [client] = useState(() => new QueryClient());
  return (
    <QueryClientProvider client={client}>
      <Sheet shown={shown} />
    </QueryClientProvider>
  );
};
