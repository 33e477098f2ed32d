import type { Fault } from '@/domain/failure';
import type { BoreLayout } from '@/domain/tappet/layout/bore-layout';
import { layoutFaults } from '@/domain/tappet/layout/layout-faults';

export interface EngineFields {
  readonly reference: string;
  readonly layout: BoreLayout;
  readonly blockCasting: string;
  readonly headCastings: string;
  readonly serial: string;
}

const tooLong = (field: keyof EngineFields, text: string): readonly Fault[] =>
  text.length > 120 ? [{ pointer: `/${field}`, detail: 'At most 120 characters.' }] : [];

export const engineFaults = (engine: EngineFields): readonly Fault[] => [
  ...(engine.reference.trim() === '' || engine.reference.trim().length > 40
    ? [{ pointer: '/reference', detail: 'Give the engine your own name, 1 to 40 characters.' }]
    : []),
  ...tooLong('blockCasting', engine.blockCasting),
  ...tooLong('headCastings', engine.headCastings),
  ...tooLong('serial', engine.serial),
  ...layoutFaults(engine.layout).map(({ pointer, detail }) => ({
    pointer: `/layout${pointer}`,
    detail,
  })),
];
