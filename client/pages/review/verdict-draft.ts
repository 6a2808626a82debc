import type { Candidate } from '../../../shared/schemas/run';
import type { NewVerdict } from '../../../shared/schemas/verdict';
import type { Flag, Grade, VerdictValue } from '../../../shared/words';

/** What has been chosen and typed for a candidate before its verdict is given. */
export interface VerdictDraft {
  grade: Grade | null;
  flags: readonly Flag[];
  remark: string;
}

export const EMPTY_DRAFT: VerdictDraft = { grade: null, flags: [], remark: '' };

/** The grade after a press on `grade`: the same one again takes it away. */
export function withGrade(draft: VerdictDraft, grade: Grade): VerdictDraft {
  return { ...draft, grade: draft.grade === grade ? null : grade };
}

/** The flags after a press on `flag`. */
export function withFlag(draft: VerdictDraft, flag: Flag): VerdictDraft {
  const flags = draft.flags.includes(flag)
    ? draft.flags.filter((one) => one !== flag)
    : [...draft.flags, flag];
  return { ...draft, flags };
}

/** The verdict to send on a candidate of a run. */
export function verdictOfDraft(
  { a, b }: Pick<Candidate, 'a' | 'b'>,
  value: VerdictValue,
  { grade, flags, remark }: VerdictDraft,
  run: number,
): NewVerdict {
  return {
    entryA: a.entryId,
    entryB: b.entryId,
    value,
    grade,
    flags: [...flags],
    remark: remark.trim(),
    run,
  };
}

/** What had been chosen and typed for a verdict, to begin from when it is taken back. */
export function draftOfVerdict({ grade, flags, remark }: NewVerdict): VerdictDraft {
  return { grade, flags, remark };
}
