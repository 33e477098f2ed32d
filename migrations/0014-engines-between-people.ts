import { Migration } from '@mikro-orm/migrations';
import { appendFunction } from './sql';

/** Builders, guardians, engines that change hands or cars, and paperwork that is taken back. */
export class EnginesBetweenPeople extends Migration {
  override up(): void {
    this.builders();
    this.transfers();
    this.guardians();
    this.swapsAndWithdrawals();
  }

  private builders(): void {
    // What a competitor lets a builder do; no engines named means all of theirs.
    this.addSql(`
create table public.builder_grant (
  id uuid primary key,
  competitor_id uuid not null references public.person (id),
  email text not null check (email = lower(email)),
  builder_id uuid references public.person (id),
  engine_ids uuid[],
  rights text[] not null check (rights <@ array['sheets', 'answers', 'hand-in', 'verdicts'] and cardinality(rights) > 0),
  until_at timestamptz not null,
  token_hash bytea not null unique check (length(token_hash) = 32),
  invited_at timestamptz not null,
  expires_at timestamptz not null,
  accepted_at timestamptz,
  withdrawn_at timestamptz,
  version integer not null default 1,
  check ((accepted_at is null) = (builder_id is null))
)`);
    this.addSql('create index builder_grant_by_builder on public.builder_grant (builder_id)');
    this.addSql('create index builder_grant_by_competitor on public.builder_grant (competitor_id)');
  }

  private transfers(): void {
    // Whoever holds a lent engine declares it until the loan ends.
    this.addSql(`
alter table public.engine
  add column holder_id uuid references public.person (id),
  add column held_until timestamptz,
  add check ((holder_id is null) = (held_until is null))`);
    this.addSql('create index engine_by_holder on public.engine (holder_id)');
    this.addSql('create index paperwork_by_engine on public.paperwork (engine_id)');
    this.addSql(`
create table public.engine_offer (
  id uuid primary key,
  engine_id uuid not null references public.engine (id),
  from_id uuid not null references public.person (id),
  email text not null check (email = lower(email)),
  kind text not null check (kind in ('sold', 'lent')),
  until_at timestamptz,
  token_hash bytea not null unique check (length(token_hash) = 32),
  offered_at timestamptz not null,
  expires_at timestamptz not null,
  accepted_at timestamptz,
  accepted_by uuid references public.person (id),
  withdrawn_at timestamptz,
  check ((kind = 'lent') = (until_at is not null))
)`);
    this.addSql(
      'create unique index engine_offer_open on public.engine_offer (engine_id) where accepted_at is null and withdrawn_at is null',
    );
    this.addSql(`
create table record.engine_transfer (
  id uuid primary key,
  engine_id uuid not null references public.engine (id),
  kind text not null check (kind in ('sold', 'lent', 'returned')),
  from_id uuid not null references public.person (id),
  to_id uuid not null references public.person (id),
  until_at timestamptz,
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp()
)`);
    this.addSql('create index engine_transfer_by_engine on record.engine_transfer (engine_id)');
    this.addSql('create index engine_transfer_by_act on record.engine_transfer (act_id)');
    const columns = ['id', 'engine_id', 'kind', 'from_id', 'to_id', 'until_at', 'act_id'];
    this.addSql(appendFunction('engine_transfer', columns));
  }

  private guardians(): void {
    this.addSql(`
create table public.guardianship (
  series_id uuid not null references public.series (id),
  id uuid not null,
  minor_id uuid not null references public.person (id),
  guardian_name text not null check (length(guardian_name) between 1 and 120),
  guardian_email text not null check (guardian_email = lower(guardian_email)),
  guardian_id uuid references public.person (id),
  marked_by uuid not null references public.person (id),
  since timestamptz not null,
  ended_at timestamptz,
  primary key (series_id, id)
)`);
    this.addSql(
      'create unique index guardianship_live on public.guardianship (series_id, minor_id) where ended_at is null',
    );
    this.addSql('create index guardianship_by_guardian on public.guardianship (guardian_id)');
    this.addSql(`
create table public.guardian_request (
  series_id uuid not null,
  id uuid not null,
  guardianship_id uuid not null,
  paperwork_id uuid not null,
  token_hash bytea not null unique check (length(token_hash) = 32),
  asked_by uuid not null references public.person (id),
  asked_at timestamptz not null,
  expires_at timestamptz not null,
  used_at timestamptz,
  primary key (series_id, id),
  foreign key (series_id, paperwork_id) references public.paperwork (series_id, id),
  foreign key (series_id, guardianship_id) references public.guardianship (series_id, id)
)`);
    this.addSql(`
create table record.guardian_signature (
  series_id uuid not null,
  paperwork_id uuid not null,
  number integer not null,
  minor_id uuid not null references public.person (id),
  guardian_id uuid not null references public.person (id),
  method text not null check (method in ('fresh-sign-in', 'e-mailed-link')),
  authenticated_at timestamptz not null,
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, paperwork_id, number),
  foreign key (series_id, paperwork_id, number)
    references record.paperwork_version (series_id, paperwork_id, number)
)`);
    this.addSql('create index guardian_signature_by_act on record.guardian_signature (act_id)');
    this.addSql(
      appendFunction('guardian_signature', [
        'series_id',
        'paperwork_id',
        'number',
        'minor_id',
        'guardian_id',
        'method',
        'authenticated_at',
        'act_id',
      ]),
    );
  }

  private swapsAndWithdrawals(): void {
    this.addSql('alter table public.entry add column engine_id uuid references public.engine (id)');
    this.addSql(`
create table record.engine_swap (
  series_id uuid not null,
  id uuid not null,
  event_id uuid not null,
  entry_id uuid not null,
  car_number text not null,
  from_engine_id uuid references public.engine (id),
  from_reference text not null,
  to_engine_id uuid not null references public.engine (id),
  to_reference text not null,
  seal text not null,
  photograph_id uuid not null,
  photograph_sha256 bytea not null check (length(photograph_sha256) = 32),
  paperwork_id uuid not null,
  due_at timestamptz not null,
  made_by uuid not null references public.person (id),
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, id),
  foreign key (series_id, entry_id) references public.entry (series_id, id),
  foreign key (series_id, paperwork_id) references public.paperwork (series_id, id)
)`);
    this.addSql('create index engine_swap_by_entry on record.engine_swap (series_id, entry_id)');
    this.addSql('create index engine_swap_by_engine on record.engine_swap (to_engine_id)');
    this.addSql('create index engine_swap_by_act on record.engine_swap (act_id)');
    this.addSql(
      appendFunction('engine_swap', [
        'series_id',
        'id',
        'event_id',
        'entry_id',
        'car_number',
        'from_engine_id',
        'from_reference',
        'to_engine_id',
        'to_reference',
        'seal',
        'photograph_id',
        'photograph_sha256',
        'paperwork_id',
        'due_at',
        'made_by',
        'act_id',
      ]),
    );
    this.addSql(`
create table record.paperwork_withdrawal (
  series_id uuid not null,
  paperwork_id uuid not null,
  number integer not null,
  state_before text not null check (state_before in ('handed-in', 'accepted', 'returned')),
  reason text not null,
  withdrawn_by uuid not null references public.person (id),
  act_id uuid not null,
  received_at timestamptz not null default clock_timestamp(),
  primary key (series_id, paperwork_id),
  foreign key (series_id, paperwork_id, number)
    references record.paperwork_version (series_id, paperwork_id, number)
)`);
    this.addSql('create index paperwork_withdrawal_by_act on record.paperwork_withdrawal (act_id)');
    this.addSql(
      appendFunction('paperwork_withdrawal', [
        'series_id',
        'paperwork_id',
        'number',
        'state_before',
        'reason',
        'withdrawn_by',
        'act_id',
      ]),
    );
  }
}
