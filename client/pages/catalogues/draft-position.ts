import type { ColumnMapping } from '../../../shared/schemas/mapping';

type Position = ColumnMapping['position'];

/** A position whose columns may still have to be chosen. */
export type DraftPosition =
  | (Omit<Extract<Position, { kind: 'two-columns' }>, 'raColumn' | 'decColumn'> & {
      raColumn: number | null;
      decColumn: number | null;
    })
  | (Omit<Extract<Position, { kind: 'one-column' }>, 'column'> & { column: number | null });

/** The position once every column is chosen, else null. */
export function completePosition(draft: DraftPosition): Position | null {
  if (draft.kind === 'one-column') return draft.column === null ? null : { ...draft, column: draft.column };
  const { raColumn, decColumn } = draft;
  return raColumn === null || decColumn === null ? null : { ...draft, raColumn, decColumn };
}
