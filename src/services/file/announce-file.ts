import type { EntityManager } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { KeptFile } from '@/entities/paperwork/file';
import { type ActDeps, performAct } from '../act/perform-act';
import { sweptAt } from './sweep-upload';

/** A file and what it belongs to: a paperwork, an inspection or a gauge. */
export type AnnouncedFile = Pick<
  KeptFile,
  'id' | 'purpose' | 'item' | 'name' | 'declaredType' | 'declaredBytes'
> &
  Partial<Pick<KeptFile, 'paperworkId' | 'inspectionId' | 'gaugeId'>>;

/** The type that a browser says; many say none. */
export const announcedType = (said: string): string =>
  said.trim() === '' ? 'application/octet-stream' : said.trim();

/** Refused before a byte is sent. */
export const tooManyBytes = (detail: string): Failure =>
  failure('too-large', detail, [{ pointer: '/bytes', detail }]);

/**
 * Writes down that a file is to come and where its bytes go; what was not confirmed within a day is
 * swept. It counts only after the server has read it back.
 */
export const announceFile = async (
  deps: ActDeps,
  actor: Actor,
  request: {
    readonly act: string;
    readonly kind: string;
    readonly seriesId: string;
    readonly input: unknown;
  },
  file: AnnouncedFile,
  /** Within the act: why it may not come. */
  findObstacle: (em: EntityManager) => Promise<Failure | undefined> = async () => undefined,
): Promise<Result<AnnouncedFile & { readonly uploadKey: string }, Failure>> => {
  const { act: id, kind, seriesId, input } = request;
  const uploadKey = `uploads/${seriesId}/${file.id}`;
  const announced = await performAct(
    deps,
    actor,
    { id, kind, seriesId, input },
    async ({ em, at, send }) => {
      const obstacle = await findObstacle(em);
      if (obstacle !== undefined) return fail(obstacle);
      em.persist(
        em.create(KeptFile, {
          ...file,
          seriesId,
          uploadKey,
          state: 'expected',
          createdBy: actor.personId,
          createdAt: at,
        }),
      );
      send('sweep-uploads', { seriesId, fileId: file.id }, sweptAt(at));
      return ok({ fileId: file.id });
    },
  );
  return announced.ok ? ok({ ...file, uploadKey }) : announced;
};
