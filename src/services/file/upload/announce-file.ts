import { type EntityManager, LockMode } from '@mikro-orm/postgresql';
import type { Actor } from '@/domain/access/permission';
import { absent, type Failure, failure } from '@/domain/failure';
import { fail, ok, type Result } from '@/domain/result';
import { KeptFile } from '@/entities/paperwork/file';
import { type ActDeps, performAct } from '../../act/perform-act';
import { type AnnouncedFile, expectAgain, isSameFile } from './announce-again';
import { sweptAt } from './sweep-upload';

/** The type that a browser says; many say none. */
export const announcedType = (said: string): string =>
  said.trim() === '' ? 'application/octet-stream' : said.trim();

/** Refused before a byte is sent. */
export const tooManyBytes = (detail: string): Failure =>
  failure('too-large', detail, [{ pointer: '/bytes', detail }]);

/** Within the act: why the file may not come at all, and why one more may not. */
interface Obstacles {
  readonly any?: (em: EntityManager) => Promise<Failure | undefined>;
  readonly more?: (em: EntityManager) => Promise<Failure | undefined>;
}

/**
 * Writes down that a file is to come and where its bytes go; what was not confirmed within a day is
 * swept. Announced again by the same person it is expected anew. It counts only after the server has
 * read it back.
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
  obstacles: Obstacles = {},
): Promise<Result<AnnouncedFile & { readonly uploadKey: string }, Failure>> => {
  const { act: id, kind, seriesId, input } = request;
  const uploadKey = `uploads/${seriesId}/${file.id}`;
  const announced = await performAct(
    deps,
    actor,
    { id, kind, seriesId, input },
    async ({ em, at, send }) => {
      const unwelcome = await obstacles.any?.(em);
      if (unwelcome !== undefined) return fail(unwelcome);
      const lock = { lockMode: LockMode.PESSIMISTIC_WRITE };
      const before = await em.findOne(KeptFile, { seriesId, id: file.id }, lock);
      if (before === null) {
        const crowded = await obstacles.more?.(em);
        if (crowded !== undefined) return fail(crowded);
        const by = { createdBy: actor.personId, createdAt: at };
        em.persist(em.create(KeptFile, { ...file, ...by, seriesId, uploadKey, state: 'expected' }));
      } else {
        if (!isSameFile(before, file, actor.personId)) return fail(absent());
        expectAgain(before, at);
      }
      send('sweep-uploads', { seriesId, fileId: file.id }, sweptAt(at));
      return ok({ fileId: file.id });
    },
  );
  return announced.ok ? ok({ ...file, uploadKey }) : announced;
};
