import { Migration } from '@mikro-orm/migrations';
import { appendFunction } from './sql';

/**
 * What became of each message, which optional ones somebody turned off, how somebody was served whom
 * a message did not reach, and uploads that are sent in parts.
 */
export class MailAndUploads extends Migration {
  override up(): void {
    this.addSql('alter table public.file add column upload_id text');
    this.addSql(`
alter table public.mail
  drop constraint mail_state_check,
  add constraint mail_state_check check
    (state in ('to-send', 'sent', 'failed', 'refused', 'given-up', 'bounced', 'turned-off')),
  -- What the receiving server said last, in its own words.
  add column answer text,
  add column changed_at timestamptz`);
    this.addSql(`
create table public.mail_turned_off (
  person_id uuid not null references public.person (id),
  topic text not null,
  since timestamptz not null,
  primary key (person_id, topic)
)`);
    this.addSql(`
create table public.mail_off_link (
  token_hash bytea primary key check (length(token_hash) = 32),
  person_id uuid not null references public.person (id),
  topic text not null,
  created_at timestamptz not null
)`);
    this.addSql(`
create table record.served_otherwise (
  series_id uuid not null,
  id uuid not null,
  mail_id uuid not null references public.mail (id),
  how text not null check (length(how) > 0),
  -- When it was handed over, as the official says.
  served_at timestamptz not null,
  recorded_by uuid not null references public.person (id),
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, id),
  foreign key (series_id) references public.series (id)
)`);
    this.addSql('create index served_otherwise_by_act on record.served_otherwise (act_id)');
    this.addSql('create index served_otherwise_by_mail on record.served_otherwise (mail_id)');
    this.addSql(
      appendFunction('served_otherwise', [
        'series_id',
        'id',
        'mail_id',
        'how',
        'served_at',
        'recorded_by',
        'act_id',
      ]),
    );
  }
}
