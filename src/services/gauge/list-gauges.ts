import { type Actor, may, seriesWhere } from '@/domain/access/permission';
import { wallTimeAt } from '@/domain/deadline/zone';
import { gaugeOf } from '@/domain/inspection/capture/gauge-record';
import { type CalibrationState, calibrationState } from '@/domain/measurement/gauge';
import { GaugeRow } from '@/entities/event/gauge';
import { Series } from '@/entities/series/series';
import { type RegisteredGauge, registered } from '../inspection/read/inspection-file';
import type { Ports } from '../ports';

export interface GaugeListed extends RegisteredGauge {
  readonly seriesId: string;
  readonly version: number;
  readonly calibration: CalibrationState;
}

export interface Crib {
  readonly seriesId: string;
  readonly series: string;
  readonly manages: boolean;
  readonly gauges: readonly GaugeListed[];
}

const dayIn = (zone: string, at: Date): string => {
  const { year, month, day } = wallTimeAt(zone, at.getTime());
  return [year, month, day].map((part) => String(part).padStart(2, '0')).join('-');
};

/** The gauges of every series the actor works in, each with its calibration's state today. */
export const listGauges = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
): Promise<readonly Crib[]> => {
  const ids = [...seriesWhere(actor, 'gauge.read')];
  const all = await deps.db.find(Series, { id: { $in: ids } }, { orderBy: { name: 'asc' } });
  const rows = await deps.db.find(
    GaugeRow,
    { seriesId: { $in: ids } },
    { orderBy: { status: 'asc', code: 'asc' } },
  );
  return all.map(({ id: seriesId, name, zone }) => ({
    seriesId,
    series: name,
    manages: may(actor, 'gauge.manage', seriesId),
    gauges: rows
      .filter((row) => row.seriesId === seriesId)
      .map((row): GaugeListed => {
        const gauge = registered(row);
        const today = dayIn(zone, deps.clock.now());
        return {
          ...gauge,
          seriesId,
          version: row.version,
          calibration: calibrationState(gaugeOf(gauge, 'length'), today),
        };
      }),
  }));
};
