import type { Act } from '../act/perform-act';
import { queueMail } from '../mail/queue-mail';
import { officialsOf } from '../people/officials-of';
import type { Ports } from '../ports';
import type { PaperworkRow } from './read/read-row';

/**
 * Tells the series' officials that paperwork waits for them; whoever competes with it is not told. The
 * message names car and class and nothing of what was declared: mailboxes are no place for it.
 */
export const tellOfficials = async (
  deps: Pick<Ports, 'random' | 'site'>,
  act: Pick<Act, 'em' | 'at' | 'send'>,
  { seriesId, seriesName, className, carNumber, id, competitorId }: PaperworkRow,
  number: number,
): Promise<void> => {
  for (const official of await officialsOf(act.em, seriesId)) {
    if (official.id === competitorId) continue;
    queueMail(deps, act.em, act, {
      seriesId,
      personId: official.id,
      address: official.email,
      kind: 'paperwork-to-check',
      subject: `Paperwork to check: car ${carNumber}, ${className}`,
      paragraphs: [
        `Version ${number} of the paperwork for car ${carNumber} in ${className}, ${seriesName}, was handed in.`,
      ],
      next: 'look at it and accept it, or return it with remarks.',
      link: { label: 'Check the paperwork', path: `/office/paperwork/${id}` },
    });
  }
};
