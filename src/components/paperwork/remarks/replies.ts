import { createContext } from 'react';
import type { ItemRemark } from '@/domain/paperwork/state';

/** Answers to remarks while the paperwork is put right; nothing where it is only shown. */
export interface Replies {
  readonly given: readonly ItemRemark[];
  /** Items whose remark is neither followed nor answered yet. */
  readonly open: readonly string[];
  readonly onReply: (reply: ItemRemark) => void;
}

export const RepliesContext = createContext<Replies | undefined>(undefined);
