import { sql } from 'drizzle-orm';
import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { inTransaction, type Scope } from '../../db/client';
import { addCatalogue, withOwner } from '../support/fixtures';
import { createWorld, type World } from '../support/world';

describe('row-level security as the second lock', () => {
  let world: World;
  let tables: string[];

  beforeAll(async () => {
    world = await createWorld();
    await addCatalogue(world, { label: 'SECRET', sources: [{ raDeg: 10, decDeg: -10, errArcsec: 0.1 }] });
    tables = await withOwner(world, async (client) => {
      const { rows } = await client.query<{ name: string }>(`
        select c.relname as name from pg_class c join pg_attribute a on a.attrelid = c.oid and a.attname = 'group_id'
        where c.relnamespace = 'public'::regnamespace and c.relkind in ('r', 'p') and not a.attisdropped order by 1`);
      return rows.map((row) => row.name);
    });
  });
  afterAll(() => world.close());

  const count = (scope: Scope, table: string) =>
    inTransaction(world.context.database, scope, async (tx) => {
      const { rows } = await tx.execute<{ n: number }>(sql`select count(*) as n from ${sql.identifier(table)}`);
      return Number(rows[0]?.n);
    });

  it('covers every table that carries group_id, forced for its owner too', async () => {
    expect(tables).toContain('source');
    const open = await withOwner(world, async (client) => {
      const { rows } = await client.query<{ name: string }>(
        `select relname as name from pg_class c where relnamespace = 'public'::regnamespace and relname = any($1)
         and (not relrowsecurity or not relforcerowsecurity
              or not exists (select 1 from pg_policy p where p.polrelid = c.oid))`,
        [tables],
      );
      return rows;
    });
    expect(open).toEqual([]);
  });

  it('shows the rows to their own group only, and nothing while no group is set', async () => {
    const filled = ['catalogue', 'catalogue_revision', 'entry', 'source', 'object', 'alias', 'stored_file', 'job'];
    for (const table of filled) {
      expect([table, await count(world.actors.reader, table)]).toEqual([table, 1]);
    }
    for (const table of tables.filter((name) => name !== 'membership' && name !== 'audit_event')) {
      expect([table, await count(world.actors.foreign, table)]).toEqual([table, 0]);
      expect([table, await count({ groupId: null, personId: null }, table)]).toEqual([table, 0]);
    }
  });

  it('takes no row for another group', async () => {
    const attempt = inTransaction(world.context.database, world.actors.foreign, (tx) =>
      tx.execute(sql`insert into entry (id, group_id, catalogue_id, key) values (9999999, ${world.actors.owner.groupId}, 1, 'x')`),
    );
    await expect(attempt).rejects.toMatchObject({ cause: { code: '42501' } });
  });

  it('lets the application neither read a partition past its parent nor open one of another group', async () => {
    const revision = await inTransaction(world.context.database, world.actors.owner, async (tx) => {
      const { rows } = await tx.execute<{ id: number }>(sql`select id from catalogue_revision`);
      return Number(rows[0]?.id);
    });
    const direct = inTransaction(world.context.database, world.actors.owner, (tx) =>
      tx.execute(sql`select * from bulk.${sql.identifier(`source_${revision}`)}`),
    );
    await expect(direct).rejects.toMatchObject({ cause: { code: '42501' } });
    const foreign = inTransaction(world.context.database, world.actors.foreign, (tx) =>
      tx.execute(sql`select open_partition('source', ${revision})`),
    );
    await expect(foreign).rejects.toMatchObject({ cause: { code: '42501' } });
  });

  it('keeps verdicts and the audit trail append-only', async () => {
    for (const table of ['verdict', 'audit_event']) {
      const attempt = inTransaction(world.context.database, world.actors.owner, (tx) =>
        tx.execute(sql`delete from ${sql.identifier(table)}`),
      );
      await expect(attempt).rejects.toMatchObject({ cause: { code: '42501' } });
      await withOwner(world, async (client) => {
        await expect(client.query(`update ${table} set group_id = group_id`)).rejects.toMatchObject({ code: '42501' });
      });
    }
  });

  it('gives a reused connection no memory of the group before', async () => {
    await count(world.actors.owner, 'source');
    const { rows } = await world.context.database.pool.query<{ n: string }>('select count(*) as n from source');
    expect(Number(rows[0]?.n)).toBe(0);
  });
});
