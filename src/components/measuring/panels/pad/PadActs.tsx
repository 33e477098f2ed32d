import { positionKey } from '@/domain/inspection/capture/rows';
import { boreName } from '@/domain/tappet/layout/bore-layout';
import type { Bay } from '../../bay';
import { placeOf } from '../../sheet/sheet';
import type { Capture } from '../../use-capture';

interface PadActsProps {
  readonly bay: Bay;
  readonly capture: Capture;
  readonly onStrike: () => void;
  readonly onProblem: (words: string) => void;
}

/** Photographs of this bore, kept here or sent. */
export const picturesOf = ({ rows, position }: Bay): number =>
  rows.remarks.filter(
    (row) => row.kind === 'photograph' && positionKey(row.place, 'bore') === boreName(position),
  ).length;

/** Under the keys: strike, and photograph in two taps. */
export const PadActs = ({ bay, capture, onStrike, onProblem }: PadActsProps) => {
  const { position, part } = bay;
  const count = picturesOf(bay);
  const keep = async (file: File) => {
    try {
      await capture.photograph(file, {
        place: placeOf(position, 'bore'),
        item: boreName(position),
        subject: part?.clause?.number ?? '',
      });
    } catch {
      onProblem(
        'This device did not keep the photograph: its storage is closed or full. Take it again.',
      );
    }
  };
  return (
    <>
      <button className="btn btn-danger" type="button" onClick={onStrike}>
        Strike last reading
      </button>
      <label className="btn btn-file">
        Photograph{' '}
        <small>{count === 0 ? boreName(position) : `${boreName(position)}: ${count}`}</small>
        <input
          type="file"
          className="visually-hidden"
          accept="image/jpeg,image/png,image/webp"
          capture="environment"
          onChange={(event) => {
            const file = event.target.files?.[0];
            if (file !== undefined) void keep(file);
            event.target.value = '';
            // The keys belong to the number again.
            event.target.blur();
          }}
        />
      </label>
    </>
  );
};
