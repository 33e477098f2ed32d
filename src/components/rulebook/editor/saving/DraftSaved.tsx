import { SavedLine } from '@/components/look/SavedLine';
import type { SaveState } from './use-autosave';

const two = (n: number): string => String(n).padStart(2, '0');

const timeOf = (iso: string): string => {
  const at = new Date(iso);
  return `${two(at.getHours())}:${two(at.getMinutes())}`;
};

/** Where the draft stands: kept by the server, or still only on this screen. */
export const DraftSaved = ({ state, now }: { readonly state: SaveState; readonly now: string }) => {
  switch (state.kind) {
    case 'kept':
      return <SavedLine state="sent" at={timeOf(state.at)} />;
    case 'changed':
      return <SavedLine state="device" device="page" at={timeOf(now)} unsent="being sent" />;
    case 'waiting':
      return (
        <SavedLine
          state="device"
          device="page"
          at={timeOf(now)}
          unsent="no connection, trying on"
        />
      );
    case 'newer':
      return (
        <SavedLine state="device" device="page" at={timeOf(now)} unsent="not sent: choose below" />
      );
    case 'refused':
      return <SavedLine state="failed" at={timeOf(now)} unsent={state.detail} />;
  }
};
