import { publicDrawAnswer } from '@/contracts/draw/draw';
import { verifyDrawLines } from '@/domain/draw/verify-draw-lines';
import { parseVerifierKey } from '@/domain/ledger/note/verifier-key';
import { readKeys, trustedKeys } from '../../verify/trusted-keys';
import { ofStep, type Stage, stagesOf } from './stages';

const get = async (path: string): Promise<string> => {
  const response = await fetch(path, { cache: 'no-store' });
  if (!response.ok) throw new Error(`${path} answered ${response.status}.`);
  return response.text();
};

const WAITING: Stage = {
  key: 'lines-waiting',
  title: 'Announcement and result stand in the series’ signed ledger.',
  outcome: 'not checked',
  facts: [{ name: 'Found', value: 'The head that covers them is signed in a few seconds.' }],
};

/**
 * Asks for the published documents anew and runs everything on them in this browser: the draw, and
 * when its lines were written.
 */
export const fetchStages = async (series: string, drawId: string): Promise<readonly Stage[]> => {
  const at = `/api/draws/${encodeURIComponent(series)}/${encodeURIComponent(drawId)}`;
  const { announced, end } = publicDrawAnswer.parse(JSON.parse(await get(at)));
  if (end?.kind !== 'made') throw new Error('This draw was not made.');
  const stages = stagesOf({ commitment: announced.document, made: end.document });
  if (announced.proof === null || end.proof === null) return [...stages, WAITING];
  const text = await get(`/api/ledger/${encodeURIComponent(series)}/keys`);
  const { keys } = trustedKeys('', readKeys(text)?.published ?? []);
  const parsed = keys.map(parseVerifierKey).flatMap((key) => (key.ok ? [key.value] : []));
  const lines = verifyDrawLines(
    { ...announced, proof: announced.proof },
    { ...end, proof: end.proof },
    parsed,
  );
  return [...stages, ...lines.map((step) => ofStep(step))];
};
