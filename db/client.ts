import pg from 'pg';
import { drizzle, type NodePgDatabase } from 'drizzle-orm/node-postgres';
import * as catalogueTables from './schema/catalogue';
import * as groupTables from './schema/group';
import * as jobTables from './schema/job';
import * as objectTables from './schema/object';
import * as personTables from './schema/person';
import * as runTables from './schema/run';
import * as verdictTables from './schema/verdict';

const schema = {
  ...catalogueTables,
  ...groupTables,
  ...jobTables,
  ...objectTables,
  ...personTables,
  ...runTables,
  ...verdictTables,
};

// 64-bit columns and counts come as numbers: ids stay far below 2^53, and text ids are text columns.
pg.types.setTypeParser(pg.types.builtins.INT8, Number);

/** A transaction: the only handle inside a service. `$client` is for COPY. */
export type Tx = NodePgDatabase<typeof schema> & { $client: pg.PoolClient };

/** Who acts: row-level security shows only what belongs to the group (and a person's own memberships). */
export interface Scope {
  groupId: number | null;
  personId: number | null;
}

export interface Database {
  pool: pg.Pool;
  close(): Promise<void>;
}

/** Opens a pool; `onIdleError` hears of connections that die while idle (the pool replaces them by itself). */
export function openDatabase(url: string, onIdleError: (error: Error) => void, max = 10): Database {
  const pool = new pg.Pool({ connectionString: url, max, connectionTimeoutMillis: 10_000 });
  pool.on('error', onIdleError);
  // A connection may also die while it is checked out, between two queries; nobody else listens then.
  pool.on('connect', (client) => client.on('error', onIdleError));
  return { pool, close: () => pool.end() };
}

const RETRYABLE = new Set(['40001', '40P01']);
const MAX_TRIES = 4;

function isRetryable(error: unknown): boolean {
  const cause: unknown = error instanceof Error && error.cause !== undefined ? error.cause : error;
  return cause instanceof pg.DatabaseError && RETRYABLE.has(cause.code ?? '');
}

type Isolation = 'read committed' | 'repeatable read';

/**
 * Runs `work` in one transaction as `scope`. Serialisation failures and deadlocks are tried again (so `work`
 * must have no effects outside the database); every other error rolls back and is thrown on.
 */
export async function inTransaction<T>(
  database: Database,
  scope: Scope,
  work: (tx: Tx) => Promise<T>,
  isolation: Isolation = 'read committed',
): Promise<T> {
  for (let attempt = 1; ; attempt += 1) {
    try {
      return await once(database, scope, work, isolation);
    } catch (error) {
      if (attempt >= MAX_TRIES || !isRetryable(error)) throw error;
    }
  }
}

async function once<T>(
  database: Database,
  scope: Scope,
  work: (tx: Tx) => Promise<T>,
  isolation: Isolation,
): Promise<T> {
  const client = await database.pool.connect();
  // A connection that broke mid-work (or hangs in a COPY) must not go back into the pool.
  let broken: Error | undefined;
  client.on('error', noteBroken);
  function noteBroken(error: Error) {
    broken = error;
  }
  try {
    await client.query(`begin isolation level ${isolation}`);
    await client.query(`select set_config('idem.group_id', $1, true), set_config('idem.person_id', $2, true)`, [
      scope.groupId?.toString() ?? '',
      scope.personId?.toString() ?? '',
    ]);
    const result = await work(drizzle({ client, schema }));
    await client.query('commit');
    return result;
  } catch (error) {
    await client.query('rollback').catch(noteBroken);
    throw error;
  } finally {
    client.off('error', noteBroken);
    client.release(broken);
  }
}
