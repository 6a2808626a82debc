import { randomBytes } from 'node:crypto';
import pg from 'pg';
import { inject } from 'vitest';
import { OWNER_ROLE } from '../../db/cluster';
import { appUrlOf } from '../../db/migrate';

export interface TestDatabase {
  ownerUrl: string;
  appUrl: string;
  /** Removes the database, cutting off whoever is still connected. */
  drop(): Promise<void>;
}

/** A fresh, migrated, empty database: a copy of the template of this run. */
export async function createTestDatabase(): Promise<TestDatabase> {
  const name = `test_${randomBytes(8).toString('hex')}`;
  await runAsAdmin(`create database ${name} template ${inject('templateName')} owner ${OWNER_ROLE}`);
  const url = new URL(inject('ownerUrl'));
  url.pathname = `/${name}`;
  return {
    ownerUrl: url.href,
    appUrl: appUrlOf(url.href),
    drop: () => runAsAdmin(`drop database ${name} with (force)`),
  };
}

async function runAsAdmin(sql: string): Promise<void> {
  const client = new pg.Client({ connectionString: inject('adminUrl') });
  await client.connect();
  try {
    await client.query(sql);
  } finally {
    await client.end();
  }
}
