import { Migration } from '@mikro-orm/migrations';

/** People sign in; a series grants them roles. Tenant-owned keys begin with the series. */
export class PeopleAndSeries extends Migration {
  override up(): void {
    this.addSql(`
create table public.person (
  id uuid primary key,
  name text not null check (length(name) between 1 and 120),
  latin_name text,
  email text not null check (email = lower(email) and position('@' in email) > 1),
  site_admin boolean not null default false,
  created_at timestamptz not null,
  unique (email)
)`);
    this.addSql(`
create table public.identity (
  issuer text not null,
  subject text not null,
  person_id uuid not null references public.person (id),
  created_at timestamptz not null,
  primary key (issuer, subject)
)`);
    this.addSql(`
create table public.session (
  id uuid primary key,
  token_hash bytea not null unique check (length(token_hash) = 32),
  person_id uuid not null references public.person (id),
  method text not null check (method in ('identity-provider', 'email-link')),
  agent text not null default '',
  created_at timestamptz not null,
  authenticated_at timestamptz not null,
  seen_at timestamptz not null,
  expires_at timestamptz not null,
  revoked_at timestamptz
)`);
    this.addSql(
      'create index session_by_person on public.session (person_id) where revoked_at is null',
    );
    this.addSql(`
create table public.sign_in_link (
  id uuid primary key,
  token_hash bytea not null unique check (length(token_hash) = 32),
  email text not null,
  return_to text not null,
  created_at timestamptz not null,
  expires_at timestamptz not null,
  consumed_at timestamptz
)`);
    this.addSql('create index sign_in_link_by_email on public.sign_in_link (email, created_at)');
    this.addSql(`
create table public.series (
  id uuid primary key,
  slug text not null unique check (slug ~ '^[a-z0-9]+(-[a-z0-9]+)*$'),
  name text not null,
  zone text not null,
  currency text not null check (currency ~ '^[A-Z]{3}$'),
  protest_minutes integer not null check (protest_minutes between 1 and 43200),
  appeal_days integer not null check (appeal_days between 0 and 90),
  bond_minor bigint not null check (bond_minor >= 0),
  appeals_address text not null default '',
  created_at timestamptz not null
)`);
    this.addSql(`
create table public.membership (
  series_id uuid not null references public.series (id),
  id uuid not null,
  person_id uuid not null references public.person (id),
  role text not null check (role in ('competitor', 'builder', 'inspector', 'chief-inspector', 'official', 'panel')),
  granted_by uuid references public.person (id),
  since timestamptz not null,
  ended_at timestamptz,
  primary key (series_id, id)
)`);
    this.addSql(
      'create unique index membership_live on public.membership (series_id, person_id, role) where ended_at is null',
    );
    this.addSql(
      'create index membership_by_person on public.membership (person_id) where ended_at is null',
    );
    this.addSql(`
create table public.invitation (
  series_id uuid not null references public.series (id),
  id uuid not null,
  email text not null,
  role text not null check (role in ('competitor', 'builder', 'inspector', 'chief-inspector', 'official', 'panel')),
  token_hash bytea not null unique check (length(token_hash) = 32),
  invited_by uuid not null references public.person (id),
  created_at timestamptz not null,
  expires_at timestamptz not null,
  accepted_at timestamptz,
  accepted_by uuid references public.person (id),
  revoked_at timestamptz,
  primary key (series_id, id)
)`);
    this.addSql(`
create table public.mail (
  id uuid primary key,
  series_id uuid references public.series (id),
  person_id uuid references public.person (id),
  address text not null,
  kind text not null,
  subject text not null,
  message_id text not null unique,
  content jsonb not null,
  state text not null default 'to-send' check (state in ('to-send', 'sent', 'failed')),
  attempts integer not null default 0,
  last_error text,
  created_at timestamptz not null,
  sent_at timestamptz
)`);
    this.addSql('create index mail_by_series on public.mail (series_id, created_at)');
  }
}
