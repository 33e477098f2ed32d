import { defineConfig, MikroORM } from '@mikro-orm/postgresql';
import { entities } from '@/entities/all';

/** Connects as the application's role. `max` connections bound what one process may hold. */
export const openDatabase = (databaseUrl: string, max = 12): Promise<MikroORM> =>
  MikroORM.init(
    defineConfig({
      clientUrl: databaseUrl,
      entities,
      metadataCache: { enabled: false },
      forceUtcTimezone: true,
      allowGlobalContext: false,
      pool: { min: 0, max },
      driverOptions: { connection: { application_name: 'tagwire' } },
    }),
  );
