/** A column of an original row: name and cell as written. */
export interface NamedCell {
  name: string;
  cell: string;
}

/** A column that both rows have. */
export interface SharedColumn {
  name: string;
  a: string;
  b: string;
  /** 'alike': the same text or the same number; 'one empty': nothing to compare. */
  relation: 'alike' | 'differs' | 'one empty';
}

export interface RowComparison {
  shared: SharedColumn[];
  onlyA: NamedCell[];
  onlyB: NamedCell[];
}

const NUMBER = /^[+-]?(\d+\.?\d*|\.\d+)([eEdD][+-]?\d+)?$/;

/**
 * Two original rows beside each other. Columns belong together when their names are equal but for case and blanks
 * around; of equal names within a row the first with the first, the second with the second.
 */
export function compareRows(rowA: readonly NamedCell[], rowB: readonly NamedCell[]): RowComparison {
  const waiting = new Map<string, NamedCell[]>();
  for (const column of rowB) {
    const key = nameOf(column);
    waiting.set(key, [...(waiting.get(key) ?? []), column]);
  }
  const shared: SharedColumn[] = [];
  const onlyA: NamedCell[] = [];
  for (const column of rowA) {
    const partner = waiting.get(nameOf(column))?.shift();
    if (partner === undefined) onlyA.push(column);
    else {
      const [a, b] = [column.cell, partner.cell];
      shared.push({ name: column.name, a, b, relation: relationOf(a, b) });
    }
  }
  const left = new Set([...waiting.values()].flat());
  return { shared, onlyA, onlyB: rowB.filter((column) => left.has(column)) };
}

function nameOf({ name }: NamedCell): string {
  return name.trim().toLowerCase();
}

/** Numbers are compared as numbers ('1.50' is '1.5'), everything else as text without blanks around. */
export function relationOf(a: string, b: string): SharedColumn['relation'] {
  const [one, other] = [a.trim(), b.trim()];
  if (one === other) return 'alike';
  if (one === '' || other === '') return 'one empty';
  const [x, y] = [numberOf(one), numberOf(other)];
  return x !== null && y !== null && x === y ? 'alike' : 'differs';
}

function numberOf(text: string): number | null {
  return NUMBER.test(text) ? Number(text.replace(/d/i, 'e')) : null;
}
