import type { SentRow } from '@/contracts/inspection/rows';
import { type KeptPicture, strict, withStore } from './device-store';

/** Keeps a picture and the row that ties it to its bore, both or neither, written through to the device. */
export const keepPicture = (
  picture: KeptPicture,
  act: {
    readonly inspectionId: string;
    readonly rows: readonly SentRow[];
    readonly keptAt: number;
  },
): Promise<void> =>
  withStore(async (db) => {
    const change = db.transaction(['acts', 'pictures'], 'readwrite', strict);
    await change.objectStore('pictures').put(picture);
    await change.objectStore('acts').add({ ...act, state: 'waiting', pictureId: picture.fileId });
    await change.done;
  });

export const readPicture = (fileId: string): Promise<KeptPicture | undefined> =>
  withStore((db) => db.get('pictures', fileId));

/** The pictures of one inspection that this device still holds. */
export const readPictures = (inspectionId: string): Promise<readonly KeptPicture[]> =>
  withStore((db) => db.getAllFromIndex('pictures', 'by-inspection', inspectionId));

/** Gives a picture that was refused new ids, as the server's answer to the old ones stays; its row follows. */
export const renewPicture = (
  seq: number,
  ids: { readonly fileId: string; readonly announceAct: string; readonly confirmAct: string },
): Promise<void> =>
  withStore(async (db) => {
    const change = db.transaction(['acts', 'pictures'], 'readwrite', strict);
    const acts = change.objectStore('acts');
    const pictures = change.objectStore('pictures');
    const act = await acts.get(seq);
    const picture = act?.pictureId && (await pictures.get(act.pictureId));
    if (act !== undefined && picture !== undefined && picture !== '') {
      await pictures.delete(picture.fileId);
      await pictures.put({ ...picture, ...ids });
      const rows = act.rows.map((row) =>
        row.kind === 'remark' && row.remark === 'photograph' ? { ...row, value: ids.fileId } : row,
      );
      await acts.put({ ...act, rows, pictureId: ids.fileId });
    }
    await change.done;
  });
