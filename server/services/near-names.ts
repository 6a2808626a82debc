const COMPONENT = /^(.*\d)([a-z]{1,2})$/;
const LEADING_LETTERS = /^[^\d]*/;

/** What makes two different name keys differ, in words a person can check: computed from the two texts alone. */
export function differenceInWords(asked: string, known: string): string {
  const component = COMPONENT.exec(known);
  if (component?.[1] === asked) return `component ${(component[2] ?? '').toUpperCase()} is known`;
  if (COMPONENT.exec(asked)?.[1] === known) return 'known without the component letter';
  const acronyms = [asked, known].map((key) => LEADING_LETTERS.exec(key)?.[0] ?? '');
  const rests = [asked.slice(acronyms[0]?.length), known.slice(acronyms[1]?.length)];
  if (rests[0] === rests[1] && rests[0] !== '') return 'the same number under another acronym';
  if (known.startsWith(asked)) return `goes on after what was typed: …${known.slice(asked.length)}`;
  const steps = editSteps(asked, known);
  if (steps === 1) return oneStep(asked, known);
  return `${steps} characters differ`;
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
