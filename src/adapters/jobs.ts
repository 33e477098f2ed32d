import PgBoss from 'pg-boss';
import type { Jobs } from '@/services/ports';

/** The queue client of the application's role; schema and queues are the owner's. */
export const openJobs = async (
  databaseUrl: string,
  onError: (error: Error) => void,
): Promise<{ readonly boss: PgBoss; readonly jobs: Jobs }> => {
  const boss = new PgBoss({
    connectionString: databaseUrl,
    schema: 'jobs',
    migrate: false,
    max: 4,
    supervise: true,
    schedule: false,
    retryLimit: 12,
    retryDelay: 2,
    retryBackoff: true,
    application_name: 'tagwire-jobs',
  });
  boss.on('error', onError);
  await boss.start();
  return {
    boss,
    jobs: {
      send: async (em, queue, data, notBefore) => {
        const transaction = em.getTransactionContext();
        if (transaction === undefined) throw new Error('A job is sent inside a transaction.');
        const executeSql = async (text: string, values: unknown[]) => {
          const connection = await transaction.client.acquireConnection();
          return connection.query(text, values);
        };
        const id = await boss.send(queue, data, {
          db: { executeSql },
          ...(notBefore === undefined ? {} : { startAfter: notBefore }),
        });
        // A queue that does not exist answers null and nothing else.
        if (id === null) throw new Error(`There is no queue named ${queue}.`);
      },
    },
  };
};
