import type { ItemRemark } from '@/domain/paperwork/state';
import type { Shot } from '@/domain/rulebook/form/form';
import { RemarksOn } from '../remarks/RemarksOn';
import { FilePick } from './FilePick';
import { FileRow } from './FileRow';
import { SendingRow } from './SendingRow';
import { SendingSummary } from './SendingSummary';
import type { Files } from './use-files';

const PICTURES = {
  'image/jpeg': ['.jpg', '.jpeg'],
  'image/png': ['.png'],
  'image/webp': ['.webp'],
  'image/heic': ['.heic', '.heif'],
} as const;

interface PhotographsProps {
  readonly shots: readonly Shot[];
  readonly files: Files;
  readonly remarks: readonly ItemRemark[];
}

/** The shot list that the rules ask for, each with its files and their progress. */
export const Photographs = ({ shots, files, remarks }: PhotographsProps) => {
  const keptFor = (shot: Shot) =>
    files.files.some((file) => file.item === shot.subject && file.state === 'kept');
  const count = shots.filter(keptFor).length;
  return (
    <section aria-labelledby="photographs">
      <div className="section-head ruled">
        <h2 id="photographs">Photographs required</h2>
        <span className="text-ink-2">
          {count} of {shots.length}
        </span>
      </div>
      <SendingSummary files={files} />
      {shots.map((shot) => {
        const own = files.files.filter((file) => file.item === shot.subject);
        const sending = files.sending.filter((one) => one.item === shot.subject);
        return (
          <div
            className="border-b border-hair py-3"
            key={shot.subject}
            id={`photograph-${shot.subject}`}
          >
            <FilePick
              accept={PICTURES}
              label={keptFor(shot) ? 'Add another' : 'Photograph'}
              what={shot.heading}
              camera
              onFiles={(list) => void files.add(list, 'photograph', shot.subject)}
            >
              <div className="min-w-0 flex-1 basis-36">
                <strong>{shot.heading}</strong>{' '}
                <span className="num text-ink-2">{shot.clause}</span>
                <br />
                {!keptFor(shot) && sending.length === 0 && <strong>missing. </strong>}
                <span className="text-ink-2">In the picture: {shot.visible.join(', ')}.</span>
              </div>
            </FilePick>
            <RemarksOn remarks={remarks} item={shot.subject} />
            {own.map((file) => (
              <FileRow
                key={file.fileId}
                file={file}
                onRemove={() => void files.remove(file.fileId)}
              />
            ))}
            {sending.map((one) => (
              <SendingRow key={one.fileId} one={one} files={files} />
            ))}
          </div>
        );
      })}
    </section>
  );
};
