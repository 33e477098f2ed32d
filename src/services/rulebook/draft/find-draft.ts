import type { BulletinContent, RulebookContent } from '@/contracts/rulebook/read-rulebook';
import { type Actor, seriesWhere } from '@/domain/access/permission';
import { isId } from '@/domain/is-id';
import { Person } from '@/entities/people/person';
import { RulebookDraft } from '@/entities/series/rulebook-draft';
import type { Ports } from '../../ports';

interface Shared {
  readonly id: string;
  readonly seriesId: string;
  readonly classId: string;
  readonly title: string;
  readonly version: number;
  /** Who saved it last. */
  readonly updatedBy: string;
  readonly updatedAt: string;
  readonly published: boolean;
}

/** Content was read by its contract before it was kept. */
export type DraftFound =
  | (Shared & { readonly kind: 'edition'; readonly content: RulebookContent })
  | (Shared & { readonly kind: 'bulletin'; readonly content: BulletinContent });

/** A draft that this person may write; nothing otherwise. */
export const findDraft = async (
  deps: Pick<Ports, 'db'>,
  actor: Actor,
  draftId: string,
): Promise<DraftFound | undefined> => {
  const seriesIds = seriesWhere(actor, 'rulebook.write');
  if (seriesIds.length === 0 || !isId(draftId)) return undefined;
  const em = deps.db.fork();
  const draft = await em.findOne(RulebookDraft, { seriesId: { $in: [...seriesIds] }, id: draftId });
  if (draft === null) return undefined;
  const person = await em.findOne(Person, { id: draft.updatedBy });
  return {
    id: draft.id,
    seriesId: draft.seriesId,
    classId: draft.classId,
    title: draft.title,
    version: draft.version,
    updatedBy: person?.name ?? '',
    updatedAt: draft.updatedAt.toISOString(),
    published: draft.publishedAt !== null,
    kind: draft.kind,
    content: draft.content as unknown,
  } as DraftFound;
};
