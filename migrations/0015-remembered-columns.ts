import { Migration } from '@mikro-orm/migrations';

/** What a person said about the columns of sheets as they make them, by the set of their headings. */
export class RememberedColumns extends Migration {
  override up(): void {
    this.addSql(`
create table public.sheet_columns (
  person_id uuid not null references public.person (id),
  sheet text not null check (length(sheet) between 1 and 40),
  headings text not null check (headings ~ '^[0-9a-f]{64}$'),
  choices jsonb not null,
  updated_at timestamptz not null,
  primary key (person_id, sheet, headings)
)`);
  }
}
