import { escapeIdentifier, type Client } from 'pg';
import PgBoss from 'pg-boss';

/**
 * Makes or updates the job queue's schema as the owner (at run time pg-boss has `migrate: false` and the application's
 * role) and grants what the queue needs. A queue is a partition of the owner's job table, so the function that makes one
 * runs with its owner's rights.
 * @param client a connected client of the owner's role
 * @param appRole name of the application's role
 */
export async function prepareQueueSchema(client: Client, appRole: string): Promise<void> {
  const role = escapeIdentifier(appRole);
  const boss = new PgBoss({
    db: { executeSql: (text, values) => client.query(text, values) },
    migrate: true,
    schedule: false,
    supervise: false,
  });
  await boss.start();
  await boss.stop({ graceful: false });
  await client.query(`
    alter function pgboss.create_queue(text, json) security definer set search_path = pgboss, pg_temp;
    revoke execute on function pgboss.create_queue(text, json), pgboss.delete_queue(text) from public;
    grant execute on function pgboss.create_queue(text, json) to ${role};
    grant usage on schema pgboss to ${role};
    grant select, insert, update, delete on all tables in schema pgboss to ${role};
    alter default privileges in schema pgboss grant select, insert, update, delete on tables to ${role};
  `);
}
