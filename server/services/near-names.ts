const COMPONENT = /^(.*\d)([a-z]{1,2})$/;
const LEADING_TEXT = /^\D*/;
/** What stands in name keys; a slip of the finger is looked for among these. */
const ALPHABET = [..."abcdefghijklmnopqrstuvwxyz0123456789+-. '"];
/** A longer key has too many neighbours to look all of them up. */
const MAX_SLIP_LENGTH = 48;

/** How two name keys differ. 'slip' covers everything that only typing can explain. */
export interface Difference {
  kind: 'component' | 'acronym' | 'longer' | 'slip';
  /** Least number of single-character changes; a swap of two neighbours counts as one. */
  steps: number;
  words: string;
}

/** What makes two different name keys differ, in words a person can check: computed from the two texts alone. */
export function difference(asked: string, known: string): Difference {
  const steps = areSwapped(asked, known) ? 1 : editSteps(asked, known);
  const component = COMPONENT.exec(known);
  if (component?.[1] === asked) {
    return { kind: 'component', steps, words: `component ${(component[2] ?? '').toUpperCase()} is known` };
  }
  if (COMPONENT.exec(asked)?.[1] === known) {
    return { kind: 'component', steps, words: 'known without the component letter' };
  }
  const [askedSplit, knownSplit] = [splitKey(asked), splitKey(known)];
  if (askedSplit.rest !== '' && askedSplit.rest === knownSplit.rest && steps > 1) {
    const words = askedSplit.acronym === '' ? 'the same number with an acronym' : 'the same number under another acronym';
    return { kind: 'acronym', steps, words };
  }
  if (known.startsWith(asked)) {
    return { kind: 'longer', steps, words: `goes on after what was typed: …${known.slice(asked.length)}` };
  }
  if (steps > 1) return { kind: 'slip', steps, words: `${steps} characters differ` };
  return { kind: 'slip', steps, words: areSwapped(asked, known) ? 'two neighbouring characters are swapped' : oneStep(asked, known) };
}

function oneStep(asked: string, known: string): string {
  const noun = (char: string) => (/\d/.test(char) ? 'digit' : 'character');
  if (asked.length === known.length) {
    const at = [...asked].findIndex((char, i) => char !== known[i]);
    return `one ${noun(known[at] ?? '')} differs`;
  }
  const [short, long] = asked.length < known.length ? [asked, known] : [known, asked];
  const at = [...long].findIndex((char, i) => char !== short[i]);
  return `one ${noun(long[at] ?? '')} ${long === known ? 'missing' : 'too many'}`;
}

function areSwapped(a: string, b: string): boolean {
  if (a.length !== b.length) return false;
  const at = [...a].findIndex((char, i) => char !== b[i]);
  return at >= 0 && a[at] !== a[at + 1] && swapped(a, at) === b;
}

const swapped = (text: string, at: number) =>
  text.slice(0, at) + (text[at + 1] ?? '') + (text[at] ?? '') + text.slice(at + 2);

/** The text before the first digit, and what follows: 'wick12b' -> 'wick' and '12b'. */
export function splitKey(key: string): { acronym: string; rest: string } {
  const acronym = LEADING_TEXT.exec(key)?.[0] ?? '';
  return { acronym, rest: key.slice(acronym.length) };
}

/**
 * Every text that one slip turns into this key: a character missing, too many or replaced, or two neighbours
 * swapped. Empty for keys of more than 48 characters. Looking each of them up finds the same names as comparing
 * this key with every known one, in time that does not grow with their number.
 */
export function oneSlipAway(key: string): string[] {
  if (key.length > MAX_SLIP_LENGTH) return [];
  const texts = new Set<string>();
  for (let at = 0; at <= key.length; at += 1) {
    const head = key.slice(0, at);
    const tail = key.slice(at);
    for (const char of ALPHABET) {
      texts.add(head + char + tail);
      if (tail !== '') texts.add(head + char + tail.slice(1));
    }
    if (tail !== '') texts.add(head + tail.slice(1));
    if (tail.length > 1) texts.add(swapped(key, at));
  }
  texts.delete(key);
  texts.delete('');
  return [...texts];
}

/** One of each list in turn, so that no kind of near miss crowds out the others. */
export function inTurns<T>(lists: readonly (readonly T[])[]): T[] {
  const longest = Math.max(0, ...lists.map((list) => list.length));
  return Array.from({ length: longest }, (_, i) => lists.flatMap((list) => list.slice(i, i + 1))).flat();
}

/** Least number of single-character insertions, deletions and replacements (Levenshtein 1966). */
export function editSteps(a: string, b: string): number {
  let before = Array.from({ length: b.length + 1 }, (_, i) => i);
  for (let i = 1; i <= a.length; i += 1) {
    const now = [i];
    for (let k = 1; k <= b.length; k += 1) {
      const replaced = (before[k - 1] ?? 0) + (a[i - 1] === b[k - 1] ? 0 : 1);
      now.push(Math.min(replaced, (before[k] ?? 0) + 1, (now[k - 1] ?? 0) + 1));
    }
    before = now;
  }
  return before[b.length] ?? 0;
}
