import { Migration } from '@mikro-orm/migrations';

/** Questions about a clause, in writing; the answer is private, or a clarification for everybody. */
export class RulesQuestions extends Migration {
  override up(): void {
    this.addSql(`
create table public.rules_question (
  series_id uuid not null,
  id uuid not null,
  class_id uuid not null,
  clause text not null check (length(clause) between 1 and 40),
  question text not null check (length(question) between 1 and 20000),
  asked_by uuid not null references public.person (id),
  asked_at timestamptz not null,
  state text not null default 'open' check (state in ('open', 'answered', 'clarified')),
  answer text not null default '',
  answered_by uuid references public.person (id),
  answered_at timestamptz,
  clarification_id uuid,
  version integer not null default 1,
  primary key (series_id, id),
  foreign key (series_id, class_id) references public.class (series_id, id),
  foreign key (series_id, clarification_id) references record.rule_publication (series_id, id)
    deferrable initially deferred,
  check ((state = 'open') = (answered_at is null)),
  check ((state = 'clarified') = (clarification_id is not null))
)`);
    this.addSql(
      'create index rules_question_by_class on public.rules_question (series_id, class_id, state)',
    );
    this.addSql('create index rules_question_by_person on public.rules_question (asked_by)');
  }
}
