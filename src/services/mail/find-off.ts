import type { MailTopic } from '@/domain/mail/mail-topics';
import type { Ports } from '../ports';
import { newToken, tokenHash } from '../session/token';
import type { MailOff } from './render-mail';

/** An address that turns this kind off for this person; or that it is off already. */
export const findOff = async (
  { db, clock, random, site }: Pick<Ports, 'db' | 'clock' | 'random' | 'site'>,
  personId: string,
  { id, title }: MailTopic,
): Promise<MailOff | 'turned-off'> => {
  const [off] = await db.execute<{ n: number }[]>(
    'select 1 as n from public.mail_turned_off where person_id = ? and topic = ?',
    [personId, id],
  );
  if (off !== undefined) return 'turned-off';
  const token = newToken(random);
  await db.execute(
    'insert into public.mail_off_link (token_hash, person_id, topic, created_at) values (?, ?, ?, ?)',
    [tokenHash(token), personId, id, clock.now()],
  );
  return { title, url: `${site.publicUrl}/mail/off/${token}` };
};
