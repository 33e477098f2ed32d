import { moneyWords } from '@/domain/verdict/money';
import type { NoticeDocument } from '@/domain/verdict/notice';
import {
  appealUntilWords,
  DECISION_WORDS,
  decisionWords,
  penaltySentence,
  provisionalWords,
} from '@/domain/verdict/notice-words';
import type { NewMail } from '../mail/queue-mail';

/** What the competitor is told, with the PDF attached. */
export const noticeMail = (
  notice: NoticeDocument,
  objectKey: string,
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
    ],
    link: {
      label: 'Read the notice',
      path: `/series/${notice.series.slug}/verdicts/${notice.number}`,
    },
    attachments: [{ name: `notice-${notice.number}.pdf`, type: 'application/pdf', objectKey }],
  };
};
