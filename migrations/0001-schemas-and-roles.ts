import { Migration } from '@mikro-orm/migrations';
import { asAppRole } from './sql';

/**
 * Two roles, four schemas. The owner (who runs this) owns them all; the application may change
 * `public`, read `record`, work the `jobs` and call `append`. PUBLIC gets nothing.
 */
export class SchemasAndRoles extends Migration {
  override up(): void {
    this.addSql('create schema if not exists record');
    this.addSql('create schema if not exists append');
    this.addSql('create schema if not exists jobs');
    this.addSql('revoke all on schema public from public');
    this.addSql('alter default privileges revoke execute on functions from public');
    this.addSql('alter default privileges revoke all on tables from public');
    for (const schema of ['public', 'record', 'append', 'jobs']) {
      this.addSql(asAppRole(`grant usage on schema ${schema} to %I`));
    }
    for (const schema of ['public', 'jobs']) {
      this.addSql(
        asAppRole(
          `alter default privileges in schema ${schema} grant select, insert, update, delete on tables to %I`,
        ),
      );
    }
    this.addSql(
      asAppRole('alter default privileges in schema record grant select on tables to %I'),
    );
    this.addSql(
      asAppRole('alter default privileges in schema append grant execute on functions to %I'),
    );
    this.addSql(asAppRole('grant select on all tables in schema record to %I'));
  }
}
