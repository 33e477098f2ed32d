import type { SecondAsked } from '@/domain/inspection/second-set/asked';
import type { Bay, Hands } from '../../bay';

/** What is being said instead of a number. */
export type PadPanel = 'strike' | 'more' | 'set-up' | 'not-reached' | 'move';

export interface PanelBesideProps {
  readonly panel: PadPanel;
  readonly bay: Bay;
  readonly hands: Hands;
  readonly open: (panel: PadPanel | undefined) => void;
  readonly onSecond: (asked: SecondAsked) => void;
  readonly onRedo: (runId: string) => void;
  /** Whether there is a keypad to go back to. */
  readonly closable: boolean;
}
