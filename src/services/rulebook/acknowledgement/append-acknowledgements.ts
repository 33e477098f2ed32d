import type { Actor } from '@/domain/access/permission';
import { toHex } from '@/domain/ledger/bytes';
import { canonicalJson } from '@/domain/ledger/canonical';
import type { Act } from '../../act/perform-act';
import type { Ports } from '../../ports';

export interface Acknowledgement {
  readonly bulletinId: string;
  /** Of the bulletin's document. */
  readonly hash: Uint8Array;
  readonly way: 'own' | 'in-person';
  readonly personId: string | null;
  readonly entryId: string | null;
  /** Who says to have read it. */
  readonly name: string;
}

/** Appends who read which bulletins, with one ledger line that commits to all of it and shows none. */
export const appendAcknowledgements = (
  { random }: Pick<Ports, 'random'>,
  { append, line, at }: Act,
  actor: Actor,
  seriesId: string,
  given: readonly Acknowledgement[],
): void => {
  const rows = given.map((one) => ({ ...one, id: random.uuid() }));
  append(
    'bulletin_acknowledgement',
    rows.map((one) => ({
      series_id: seriesId,
      id: one.id,
      bulletin_id: one.bulletinId,
      hash: one.hash,
      way: one.way,
      person_id: one.personId,
      entry_id: one.entryId,
      name: one.name,
      recorded_by: actor.personId,
      acknowledged_at: at.toISOString(),
    })),
  );
  const document = {
    document: 'tagwire/bulletin-acknowledgement',
    version: '1',
    acknowledged: rows.map((one) => ({
      id: one.id,
      bulletin: one.bulletinId,
      hash: toHex(one.hash),
      way: one.way,
      name: one.name,
      at: at.toISOString(),
    })),
  };
  line({
    seriesId,
    kind: 'bulletin-acknowledged',
    contents: { acknowledgement: { text: canonicalJson(document), open: false } },
    refs: {},
  });
};
