import { readFileSync } from 'node:fs';
import { expect } from 'vitest';
import { z } from 'zod';

/**
 * Check values from outside: published ones, and ones computed with reference libraries at high precision. Each entry
 * names its source (`source`) and how it was obtained (`how`); tolerances are those of the entry.
 */
const entrySchema = z.object({
  id: z.string(),
  topic: z.string(),
  inputs: z.record(z.string(), z.unknown()),
  expected: z.record(z.string(), z.unknown()),
  tolerance: z.record(z.string(), z.number()),
  source: z.string().min(1),
});
export type CheckValue = z.infer<typeof entrySchema>;

const all = z
  .array(entrySchema)
  .parse(JSON.parse(readFileSync(new URL('./data/check-values.json', import.meta.url), 'utf8')));

/** All entries whose id begins with one of the prefixes, as rows for `it.each`: [title, entry]. Never empty. */
export function checkValues(...prefixes: string[]): [string, CheckValue][] {
  const entries = all.filter((entry) => prefixes.some((prefix) => entry.id.startsWith(prefix)));
  if (entries.length === 0) throw new RangeError(`no check values for ${prefixes.join(', ')}`);
  return entries.map((entry) => [`${entry.id} (${entry.source})`, entry]);
}

/** Ids of all entries: for the test that none is left aside. */
export const checkValueIds: readonly string[] = all.map((entry) => entry.id);

/** An input that must be a number. */
export function numberInput(entry: CheckValue, name: string): number {
  return z.number().parse(entry.inputs[name], { error: () => `${entry.id}: input ${name}` });
}

export function textInput(entry: CheckValue, name: string): string {
  return z.string().parse(entry.inputs[name], { error: () => `${entry.id}: input ${name}` });
}

export function numbersInput(entry: CheckValue, name: string): number[] {
  return z.array(z.number()).parse(entry.inputs[name], { error: () => `${entry.id}: input ${name}` });
}

/** Compares every expected value with what was computed; numbers within the tolerance of the entry. */
export function expectAsGiven(entry: CheckValue, computed: Readonly<Record<string, unknown>>): void {
  for (const [name, wanted] of Object.entries(entry.expected)) {
    const value = computed[name];
    if (typeof wanted !== 'number') {
      expect(value, `${entry.id} ${name}`).toEqual(wanted);
      continue;
    }
    expect(typeof value, `${entry.id} ${name}`).toBe('number');
    const off = Math.abs(Number(value) - wanted);
    expect(off, `${entry.id} ${name}: ${String(value)} instead of ${wanted}`).toBeLessThanOrEqual(
      entry.tolerance[name] ?? 0,
    );
  }
}
