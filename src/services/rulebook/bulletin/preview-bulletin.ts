import type { BulletinContent } from '@/contracts/rulebook/read-rulebook';
import { type Actor, may } from '@/domain/access/permission';
import type { Ports } from '../../ports';
import { type BulletinChecked, checkBulletin } from './check-bulletin';

/** What publishing a bulletin now would do, for those who write it. */
export const previewBulletin = async (
  deps: Pick<Ports, 'db' | 'clock'>,
  actor: Actor,
  input: {
    readonly seriesId: string;
    readonly classId: string;
    readonly content: BulletinContent;
  },
): Promise<BulletinChecked | undefined> =>
  may(actor, 'rulebook.write', input.seriesId)
    ? checkBulletin(deps.db, input.seriesId, input.classId, input.content, deps.clock.now())
    : undefined;
