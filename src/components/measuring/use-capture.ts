import { useCallback, useEffect, useMemo, useRef, useState } from 'react';
import type { CapturesAnswer, CapturesRequest } from '@/contracts/inspection/captures';
import type { SentRow } from '@/contracts/inspection/rows';
import { wallTimeAt } from '@/domain/deadline/zone';
import type { Place } from '@/domain/inspection/capture/rows';
import {
  changeActs,
  forgetActs,
  type KeptAct,
  type KeptPicture,
  keepAct,
  readActs,
  readWaiting,
} from './queue/device-store';
import { keepPicture, readPictures, renewPicture } from './queue/picture-store';
import { postCaptures } from './queue/post-captures';
import { runSender } from './queue/run-sender';
import { sendPicture } from './queue/send-picture';
import type { SendOutcome } from './queue/send-waiting';
import { uuidV7 } from './queue/uuid-v7';
import { joinRows, type SheetRows } from './sheet/recorded';
import { photographRow } from './sheet/rows';
import type { Sheet } from './sheet/sheet';

export interface Capture {
  readonly rows: SheetRows;
  /** Rows that this device recorded. */
  readonly own: ReadonlySet<string>;
  /** Whether what this device holds has been read: nothing is entered before. */
  readonly ready: boolean;
  readonly waiting: number;
  readonly refused: readonly KeptAct[];
  readonly outcome: SendOutcome | undefined;
  readonly saved: { readonly state: 'device' | 'sent' | 'failed'; readonly at: string };
  /** Resolves once the rows are written through to the device; rejects when they are not. */
  readonly record: (rows: readonly SentRow[], place?: unknown) => Promise<void>;
  /** Keeps a photograph of a place the same way; it goes when there is signal. */
  readonly photograph: (
    file: PictureFile,
    at: { readonly place: Place; readonly item: string; readonly subject: string },
  ) => Promise<void>;
  /** Pictures that this device still holds. */
  readonly pictures: readonly KeptPicture[];
  readonly sendAgain: (seq: number) => Promise<void>;
}

export type PictureFile = Pick<File, 'name' | 'type' | 'arrayBuffer'>;

/** Server's clock less this device's, from the answer that brought the page. */
const measuredOffset = (servedAt: string): number => {
  const [page] = performance.getEntriesByType('navigation') as PerformanceNavigationTiming[];
  const arrived = performance.timeOrigin + (page?.responseStart ?? 0);
  return Math.round(Date.parse(servedAt) - arrived);
};

const clock = (zone: string, at: number): string => {
  const { hour, minute } = wallTimeAt(zone, at);
  return `${String(hour).padStart(2, '0')}:${String(minute).padStart(2, '0')}`;
};

export interface CaptureDeps {
  /** The server's rows as far as they are known now; the sheet's own are those of the page. */
  readonly known: SheetRows;
  readonly tablet: () => CapturesRequest['tablet'];
  readonly onKept: (answer: CapturesAnswer) => void;
}

/** Rows of one inspection: what the server has, what this device holds, and the way between. */
export const useCapture = (sheet: Sheet, { known, tablet, onKept }: CaptureDeps): Capture => {
  const { inspectionId, personId, zone } = sheet;
  const [acts, setActs] = useState<readonly KeptAct[]>([]);
  const [pictures, setPictures] = useState<readonly KeptPicture[]>([]);
  const [ready, setReady] = useState(false);
  const [outcome, setOutcome] = useState<SendOutcome>();
  const [changedAt, setChangedAt] = useState(() => Date.now());
  const [failedAt, setFailedAt] = useState<number>();
  const offset = useMemo(() => measuredOffset(sheet.servedAt), [sheet.servedAt]);
  const sender = useRef<ReturnType<typeof runSender>>(undefined);
  const latestTablet = useRef(tablet);
  latestTablet.current = tablet;

  const reread = useCallback(async () => {
    setActs(await readActs(inspectionId));
    setPictures(await readPictures(inspectionId));
  }, [inspectionId]);

  useEffect(() => {
    const onPage = new Set(
      [sheet.rows.readings, sheet.rows.zeros, sheet.rows.remarks].flat().map((row) => row.id),
    );
    const open = async () => {
      const kept = await readActs(inspectionId);
      const done = kept.filter(
        (act) => act.state === 'sent' && act.rows.every((row) => onPage.has(row.id)),
      );
      await forgetActs(done);
      await reread();
      setReady(true);
    };
    open().catch(() => setFailedAt(Date.now()));
    sender.current = runSender(
      {
        readWaiting,
        changeActs,
        post: async (id, body) => {
          const posted = await postCaptures(id, body);
          if (posted.kind === 'kept' && id === inspectionId) onKept(posted.answer);
          return posted;
        },
        sendPicture,
        newSending: (id) => ({
          act: uuidV7(),
          clockOffsetMs: offset,
          ...(id === inspectionId ? { tablet: latestTablet.current() } : {}),
        }),
      },
      (told) => {
        setOutcome(told);
        setChangedAt(Date.now());
        void reread();
      },
    );
    return () => sender.current?.stop();
  }, [inspectionId, offset, reread, sheet.rows, onKept]);

  const keep = useCallback(
    async (write: () => Promise<void>) => {
      try {
        await write();
      } catch (error) {
        setFailedAt(Date.now());
        throw error;
      }
      setFailedAt(undefined);
      setChangedAt(Date.now());
      await reread();
      sender.current?.now();
    },
    [reread],
  );

  const record = useCallback(
    (rows: readonly SentRow[], place?: unknown) =>
      keep(() => keepAct({ inspectionId, rows, keptAt: Date.now() }, place)),
    [inspectionId, keep],
  );

  const photograph = useCallback(
    (
      file: PictureFile,
      at: { readonly place: Place; readonly item: string; readonly subject: string },
    ) =>
      keep(async () => {
        const fileId = uuidV7();
        const { name, type } = file;
        const bytes = await file.arrayBuffer();
        await keepPicture(
          {
            fileId,
            inspectionId,
            name,
            type,
            bytes,
            item: at.item,
            announceAct: uuidV7(),
            confirmAct: uuidV7(),
          },
          {
            inspectionId,
            rows: [photographRow(at.place, at.subject, fileId)],
            keptAt: Date.now(),
          },
        );
      }),
    [inspectionId, keep],
  );

  const sendAgain = useCallback(
    async (seq: number) => {
      const ids = { fileId: uuidV7(), announceAct: uuidV7(), confirmAct: uuidV7() };
      await renewPicture(seq, ids);
      await changeActs([seq], (act) => ({
        ...act,
        state: 'waiting',
        sending: undefined,
        problem: undefined,
      }));
      await reread();
      sender.current?.now();
    },
    [reread],
  );

  const rows = useMemo(
    () =>
      joinRows(
        known,
        acts.filter((act) => act.state !== 'refused').flatMap((act) => act.rows),
        personId,
        offset,
      ),
    [known, acts, personId, offset],
  );
  const own = useMemo(() => new Set(acts.flatMap((act) => act.rows).map(({ id }) => id)), [acts]);
  const waiting = acts.filter((act) => act.state === 'waiting').length;
  const state = failedAt !== undefined ? 'failed' : waiting > 0 ? 'device' : 'sent';
  return {
    rows,
    own,
    ready,
    waiting,
    refused: acts.filter((act) => act.state === 'refused'),
    outcome,
    saved: { state, at: clock(zone, failedAt ?? changedAt) },
    record,
    photograph,
    pictures,
    sendAgain,
  };
};
