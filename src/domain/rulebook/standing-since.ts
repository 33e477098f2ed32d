import { findEffectiveAt } from './bulletin';
import type { RulesQuestion } from './rules-in-force';

/**
 * Since when the rules have stood as they stand at an instant: the last instant by then at which
 * anything published began or ceased to count. Epoch milliseconds; nothing before the first edition.
 */
export const standingSince = (question: RulesQuestion): number | undefined => {
  const { editions, bulletins, clarifications, waivers, withdrawals = [] } = question;
  const at = Date.parse(question.at);
  const first = Math.min(...editions.map((one) => Date.parse(one.inForceAt)));
  if (!(first <= at)) return undefined;
  const edges = [
    ...editions.map((one) => Date.parse(one.inForceAt)),
    ...bulletins.flatMap((one) => findEffectiveAt(one, question.eventStartsAt) ?? []),
    ...clarifications.map((one) => Date.parse(one.publishedAt)),
    ...withdrawals.map((one) => Date.parse(one.publishedAt)),
    ...waivers.flatMap((one) => [Date.parse(one.fromAt), Date.parse(one.untilAt)]),
  ];
  return Math.max(first, ...edges.filter((edge) => edge <= at));
};
