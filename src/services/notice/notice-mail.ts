import { moneyWords } from '@/domain/verdict/money';
import type { NoticeDocument } from '@/domain/verdict/notice/notice';
import {
  appealUntilWords,
  DECISION_WORDS,
  decisionWords,
  penaltySentence,
  provisionalWords,
} from '@/domain/verdict/notice/notice-words';
import type { NewMail } from '../mail/queue-mail';

/** What makes the reader of the mail a witness: kept elsewhere, it cannot be changed here. */
export interface Receipt {
  readonly line: number;
  /** Of the notice's document, hexadecimal. */
  readonly sha256: string;
  /** The signed note, byte for byte. */
  readonly head: string;
}

const receiptWords = ({ line, sha256, head }: Receipt): readonly string[] => [
  `Receipt: line ${line} of the series’ ledger holds this notice, SHA-256 ${sha256}. Keep this message: with the signed head below anybody can show later that nothing before it was changed.`,
  head.trimEnd(),
];

/** What the competitor is told, with the PDF attached. */
export const noticeMail = (
  notice: NoticeDocument,
  objectKey: string,
  receipt: Receipt | undefined,
): Omit<NewMail, 'seriesId' | 'personId' | 'address'> => {
  const penalty = penaltySentence(notice);
  return {
    kind: 'verdict-published',
    subject: `${notice.series.name}: notice ${notice.number}, car ${notice.car}, ${DECISION_WORDS[notice.decision].toLowerCase()}`,
    paragraphs: [
      decisionWords(notice),
      ...(penalty === undefined ? [] : [penalty]),
      notice.reasons,
      `${provisionalWords(notice)}. An appeal is lodged in writing by ${appealUntilWords(notice)}, with the bond of ${moneyWords(notice.appeal.bond)}.`,
      'The notice is attached. It decides on the rules of a class and certifies no engine as safe.',
      ...(receipt === undefined ? [] : receiptWords(receipt)),
    ],
    next: 'read the notice. Whoever does not accept it appeals in writing before that time.',
    link: {
      label: 'Read the notice',
      path: `/series/${notice.series.slug}/verdicts/${notice.number}`,
    },
    attachments: [{ name: `notice-${notice.number}.pdf`, type: 'application/pdf', objectKey }],
  };
};
