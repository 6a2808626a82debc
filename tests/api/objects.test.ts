import { afterAll, beforeAll, describe, expect, it } from 'vitest';
import { separationArcsec } from '../../shared/astro/sphere';
import type { ObjectAnswer, ObjectDetail, ObjectSummary } from '../../shared/schemas/object';
import { addCatalogue, type FixtureCatalogue } from '../support/fixtures';
import { createWorld, type World } from '../support/world';

interface Page {
  items: ObjectSummary[];
  next: string | null;
  total: number | null;
}

describe('objects', () => {
  let world: World;
  let left: FixtureCatalogue;
  let right: FixtureCatalogue;
  beforeAll(async () => {
    world = await createWorld();
    left = await addCatalogue(world, {
      label: 'LEFT',
      columns: ['mag'],
      mapping: { photometry: [{ column: 4, errorColumn: null, kind: 'magnitude', band: 'V', unit: 'mag' }] },
      sources: [
        { raDeg: 10, decDeg: 20, errArcsec: 1, designation: 'LEFT 1', cells: ['12.5'] },
        { raDeg: 359.9999, decDeg: 5, errArcsec: 1, designation: 'LEFT 2', cells: [''] },
        { raDeg: 0.0001, decDeg: 5, errArcsec: 1, designation: 'LEFT 3', cells: ['9'] },
        { raDeg: 77, decDeg: 89.9999, errArcsec: 1, designation: 'LEFT 4', cells: ['9'] },
      ],
    });
    right = await addCatalogue(world, {
      label: 'RIGHT',
      sources: [
        { raDeg: 10.0002, decDeg: 20, errArcsec: 1, designation: 'RIGHT 1' },
        { raDeg: 257, decDeg: 89.9999, errArcsec: 1, designation: 'RIGHT 2' },
      ],
    });
  });
  afterAll(() => world.close());

  const list = async (query: string) => (await world.agents.reader.get(world.api(`objects?${query}`))).body as Page;
  const live = async (number: number) => {
    const answer = (await world.agents.reader.get(world.api(`objects/${number}`))).body as ObjectAnswer;
    if (answer.state !== 'live') throw new Error(`#${number} forwards`);
    return answer.object;
  };
  const say = (a: number, b: number, value: string) =>
    world.agents.contributor
      .post(world.api('verdicts'), { entryA: a, entryB: b, value, grade: 'probable' })
      .then((answer) => answer.body as { verdict: { id: number } });

  it('are listed in every order, page by page, each once', async () => {
    for (const sort of ['number', 'name', 'ra', 'dec', 'entries']) {
      for (const order of ['asc', 'desc']) {
        const seen: number[] = [];
        let after = '';
        for (;;) {
          const page = await list(`sort=${sort}&order=${order}&limit=2${after}`);
          seen.push(...page.items.map((item) => item.number));
          if (page.next === null) break;
          after = `&after=${encodeURIComponent(page.next)}`;
        }
        expect([sort, order, [...seen].sort((a, b) => a - b)]).toEqual([sort, order, [1, 2, 3, 4, 5, 6]]);
      }
    }
  });

  it('are found by a cone across RA 0 and across the pole, nearest first, exactly to the radius', async () => {
    const across = await list('ra=0&dec=5&radiusArcsec=1');
    expect(across.items.map((item) => item.name)).toEqual(['LEFT 2', 'LEFT 3']);
    const pole = await list('ra=77&dec=89.9999&radiusArcsec=1');
    expect(pole.items.map((item) => item.name)).toEqual(['LEFT 4', 'RIGHT 2']);
    expect(pole.items[1]?.sepArcsec).toBeCloseTo(0.72, 6);
    const sep = separationArcsec(10, 20, 10.0002, 20);
    const inside = await list(`ra=10&dec=20&radiusArcsec=${sep + 1e-6}`);
    const outside = await list(`ra=10&dec=20&radiusArcsec=${sep - 1e-6}`);
    expect([inside.total, outside.total]).toEqual([2, 1]);
  });

  it('are filtered by part of a name, by catalogue and by number of sources', async () => {
    expect((await list('name=left%202')).items.map((item) => item.name)).toEqual(['LEFT 2']);
    expect((await list('catalogue=right')).total).toBe(2);
    expect((await list('minEntries=2')).total).toBe(0);
  });

  it('show names with their origin, measurements, and what holds them together; numbers forward and come back', async () => {
    const { verdict } = await say(left.entryIds[0] ?? 0, right.entryIds[0] ?? 0, 'same');
    const object = await live(1);
    expect(object.members.map((member) => member.designation)).toEqual(['LEFT 1', 'RIGHT 1']);
    expect(object.members[0]?.measurements).toEqual([{ quantity: 'magnitude V', value: '12.5', error: null, unit: 'mag' }]);
    expect(object.raDeg).toBeCloseTo(10.0001, 9);
    expect(object.errArcsec).toBeCloseTo(Math.SQRT1_2, 9);
    expect(object.aliases.map((alias) => [alias.name, alias.from])).toEqual([
      ['LEFT 1', 'LEFT row 1'],
      ['RIGHT 1', 'RIGHT row 1'],
    ]);
    expect(object.formerNumbers).toEqual([5]);
    expect(object.verdicts).toMatchObject([{ value: 'same', grade: 'probable', designationA: 'LEFT 1' }]);
    expect(object.history.map((event) => event.what)).toContain('verdict: same');
    const forwarded = await world.agents.reader.get(world.api('objects/5'));
    expect(forwarded.body).toEqual({ state: 'forwarded', number: 5, forwardsTo: 1 });
    expect((await list('minEntries=2')).items.map((item) => item.catalogues)).toEqual([['LEFT', 'RIGHT']]);
    await world.agents.contributor.delete(world.api(`verdicts/${verdict.id}`)).expect(200);
    expect((await live(5)).members.map((member) => member.designation)).toEqual(['RIGHT 1']);
    expect((await live(1)).formerNumbers).toEqual([]);
  });

  it('keep notes and given names with the number they were written on', async () => {
    await world.agents.contributor.post(world.api('objects/5/notes'), { body: 'on five' }).expect(201);
    await world.agents.contributor.post(world.api('objects/5/aliases'), { name: 'Fifth Star' }).expect(204);
    const { verdict } = await say(left.entryIds[0] ?? 0, right.entryIds[0] ?? 0, 'same');
    const merged = await live(1);
    expect(merged.notes).toMatchObject([{ body: 'on five', writtenOn: 5 }]);
    expect(merged.aliases.map((alias) => alias.name)).toContain('Fifth Star');
    await world.agents.contributor.delete(world.api(`verdicts/${verdict.id}`)).expect(200);
    expect((await live(1)).notes).toEqual([]);
    expect((await live(5)).notes).toHaveLength(1);
  });

  it('take a preferred name for the version that was seen, from one of ten at once', async () => {
    const { version } = await live(2);
    const rename = (name: string, seen: string) =>
      world.agents.curator.patch(world.api('objects/2'), { name }).set('If-Match', seen).then((answer) => answer);
    const missing = await world.agents.curator.patch(world.api('objects/2'), { name: 'x' });
    expect(missing.body).toMatchObject({ status: 428, code: 'version-missing' });
    const answers = await Promise.all(Array.from({ length: 10 }, (_, i) => rename(`Name ${i}`, `"${version}"`)));
    expect(answers.filter((answer) => answer.status === 204)).toHaveLength(1);
    const refused = answers.filter((answer) => answer.status !== 204);
    expect(refused.every((answer) => (answer.body as { code: string }).code === 'stale-version')).toBe(true);
    expect((await live(2)).name).toMatch(/^Name \d$/);
  });

  it('retire names without deleting them, and say when a name is contested', async () => {
    await world.agents.contributor.post(world.api('objects/3/aliases'), { name: 'left 1' }).expect(204);
    const mine = (await live(3)).aliases.find((alias) => alias.origin === 'person');
    expect(mine?.contested).toBe(true);
    expect((await live(1)).aliases[0]?.contested).toBe(true);
    const entryName = (await live(1)).aliases[0];
    const refused = await world.agents.contributor.post(world.api(`aliases/${entryName?.id}/retire`));
    expect(refused.body).toMatchObject({ code: 'role-too-low' });
    await world.agents.contributor.post(world.api(`aliases/${mine?.id}/retire`)).expect(204);
    const again = await world.agents.contributor.post(world.api(`aliases/${mine?.id}/retire`));
    expect(again.body).toMatchObject({ code: 'already-taken-back' });
    expect((await live(1)).aliases[0]?.contested).toBe(false);
    expect((await live(3)).aliases.find((alias) => alias.id === mine?.id)?.retiredAt).not.toBeNull();
    const empty = await world.agents.contributor.post(world.api('objects/3/aliases'), { name: '  ' });
    expect(empty.status).toBe(400);
  });

  it('show the field around them and the nearest sources of any catalogue', async () => {
    const field = (await world.agents.reader.get(world.api('objects/1/field?radiusArcsec=5'))).body as {
      sources: { designation: string; member: boolean; sepArcsec: number }[];
      nearest: { designation: string }[];
    };
    expect(field.sources.map((source) => [source.designation, source.member])).toEqual([
      ['LEFT 1', true],
      ['RIGHT 1', false],
    ]);
    expect(field.nearest.map((source) => source.designation)).toEqual(['RIGHT 1']);
  });

  it('are not there for a number that nobody has, or that another group has', async () => {
    await world.agents.reader.get(world.api('objects/4711')).expect(404);
    await world.agents.foreign.get(`/api/groups/${world.foreignGroup}/objects/1`).expect(404);
  });
});

describe('notes', () => {
  let world: World;
  beforeAll(async () => {
    world = await createWorld();
    await addCatalogue(world, { label: 'ONE', sources: [{ raDeg: 1, decDeg: 1 }] });
  });
  afterAll(() => world.close());
  const notes = async () =>
    ((await world.agents.reader.get(world.api('objects/1'))).body as { object: ObjectDetail }).object.notes;

  it('are changed by their author and by curators, and keep what they said before', async () => {
    const made = await world.agents.contributor.post(world.api('objects/1/notes'), { body: 'first' }).expect(201);
    const { id } = made.body as { id: number };
    await world.agents.contributor.patch(world.api(`notes/${id}`), { body: 'second' }).expect(204);
    await world.agents.curator.patch(world.api(`notes/${id}`), { body: 'third' }).expect(204);
    expect(await notes()).toMatchObject([{ body: 'third', by: 'Test contributor' }]);
    const versions = (await world.agents.reader.get(world.api(`notes/${id}/versions`))).body as { items: { body: string }[] };
    expect(versions.items.map((one) => one.body)).toEqual(['second', 'first']);
    const own = await world.agents.curator.post(world.api('objects/1/notes'), { body: 'of the curator' });
    const foreign = await world.agents.contributor.patch(world.api(`notes/${(own.body as { id: number }).id}`), { body: 'x' });
    expect(foreign.body).toMatchObject({ status: 403, code: 'role-too-low' });
    await world.agents.contributor.delete(world.api(`notes/${id}`)).expect(204);
    expect((await notes()).map((note) => note.body)).toEqual(['of the curator']);
    await world.agents.contributor.patch(world.api(`notes/${id}`), { body: 'x' }).expect(404);
  });

  it('need a text, of a bounded length', async () => {
    for (const body of ['', '   ', 'x'.repeat(20_001)]) {
      const answer = await world.agents.contributor.post(world.api('objects/1/notes'), { body });
      expect(answer.body).toMatchObject({ status: 400, errors: [{ path: 'body' }] });
    }
  });
});
