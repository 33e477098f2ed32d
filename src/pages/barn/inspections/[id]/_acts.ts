import type { Actor } from '@/domain/access/permission';
import type { Failure } from '@/domain/failure';
import { fail, type Result } from '@/domain/result';
import { assignInspector } from '@/services/inspection/assign-inspector';
import { changeState, type StateAct } from '@/services/inspection/change-state';
import { handOverInspection } from '@/services/inspection/hand-over-inspection';
import type { Ports } from '@/services/ports';

const STATE_ACTS: readonly StateAct[] = ['open', 'hold', 'resume', 'refuse', 'stop', 'defer'];

interface Done {
  readonly result: Result<unknown, Failure>;
  readonly to: string;
}

const FAULT_OF_TEXT: Readonly<Record<string, string>> = {
  'conflict-of-interest': '/inspectorId',
};

/** A refusal without a place stands at the field it is about. */
const placed = (result: Result<unknown, Failure>): Result<unknown, Failure> => {
  if (result.ok || result.failure.faults !== undefined) return result;
  const pointer = FAULT_OF_TEXT[result.failure.name];
  const { detail } = result.failure;
  return pointer === undefined
    ? result
    : fail({ ...result.failure, faults: [{ pointer, detail }] });
};

/** Seat, hand-over and state of an inspection; nothing where the form asks for something else. */
export const actOn = async (
  ports: Ports,
  actor: Actor,
  inspectionId: string,
  text: (name: string) => string,
): Promise<Done | undefined> => {
  const page = `/barn/inspections/${inspectionId}`;
  const base = { act: text('act'), inspectionId };
  const what = text('what');
  if (what === 'assign') {
    const inspectorId = text('inspectorId') === '' ? null : text('inspectorId');
    const result = await assignInspector(ports, actor, {
      ...base,
      inspectorId,
      bay: text('bay').slice(0, 20),
      version: Number(text('version')),
    });
    return { result: placed(result), to: `${page}?saved=seat` };
  }
  if (what === 'hand-over') {
    const result = await handOverInspection(ports, actor, {
      ...base,
      inspectorId: text('inspectorId'),
      reason: text('handOverReason').slice(0, 500),
    });
    return { result: placed(result), to: `${page}?saved=hand-over` };
  }
  const to = STATE_ACTS.find((one) => one === what);
  if (to === undefined) return undefined;
  const result = await changeState(ports, actor, {
    ...base,
    to,
    reason: text('reason').slice(0, 500),
    place: text('place').slice(0, 200),
    seals: text('seals').slice(0, 200),
    bag: text('bag').slice(0, 60),
  });
  return { result, to: to === 'open' || to === 'resume' ? `${page}/measure` : page };
};
