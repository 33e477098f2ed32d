import type { EntityManager } from '@mikro-orm/postgresql';
import { paperworkForm } from '@/domain/rulebook/form/paperwork-form';
import type { RulesInForce } from '@/domain/rulebook/rules-in-force';
import type { Engine } from '@/entities/paperwork/engine';
import { Paperwork, type PaperworkState } from '@/entities/paperwork/paperwork';
import { filledIn } from '../../paperwork/filled-in';

interface Asked {
  /** For one that is begun. */
  readonly id: string;
  readonly key: {
    readonly seriesId: string;
    readonly classId: string;
    readonly carNumber: string;
    readonly competitorId: string;
    readonly engineId: string;
  };
  readonly engine: Engine;
  readonly rules: RulesInForce;
  readonly seal: string;
  readonly by: string;
  readonly at: Date;
}

const BEST: readonly PaperworkState[] = ['accepted', 'handed-in', 'returned', 'draft'];

/** What declares this engine in this car already, the accepted one first; else a new draft with what is known. */
export const swappedPaperwork = async (
  em: EntityManager,
  { id, key, engine, rules, seal, by, at }: Asked,
): Promise<{ readonly paperworkId: string }> => {
  const known = await em.find(Paperwork, { ...key, state: { $ne: 'withdrawn' } });
  const [best] = known.sort((a, b) => BEST.indexOf(a.state) - BEST.indexOf(b.state));
  if (best !== undefined) return { paperworkId: best.id };
  const draft = await filledIn(em, engine, key.competitorId, paperworkForm(rules), seal);
  em.persist(
    em.create(Paperwork, {
      id,
      ...key,
      state: 'draft',
      draft: draft as unknown as Record<string, unknown>,
      versions: 0,
      updatedBy: by,
      updatedAt: at,
    }),
  );
  return { paperworkId: id };
};
