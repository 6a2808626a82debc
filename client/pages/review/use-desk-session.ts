import { useCallback, useState } from 'react';
import { useSearchParams } from 'react-router-dom';
import type { NewVerdict } from '../../../shared/schemas/verdict';
import { withSeq } from './queue-place';
import { useGivenVerdicts } from './use-desk';
import { draftOfVerdict, EMPTY_DRAFT, type VerdictDraft } from './verdict-draft';

/** What stays while a person goes through a queue: verdicts given, what is typed for each candidate, the way on. */
export interface DeskSession {
  verdicts: ReturnType<typeof useGivenVerdicts>;
  draftOf: (seq: number) => VerdictDraft;
  /** Null when the draft has become a verdict. */
  setDraft: (seq: number, draft: VerdictDraft | null) => void;
  /** Null: to the first of the queue. */
  goTo: (seq: number | null) => void;
}

/** The session at the desk of a run. A verdict taken back leads to its candidate, with what was typed for it. */
export function useDeskSession(group: string, run: number): DeskSession {
  const [, setSearch] = useSearchParams();
  const [drafts, setDrafts] = useState<ReadonlyMap<number, VerdictDraft>>(new Map());
  const goTo = useCallback(
    (seq: number | null) => setSearch((before) => withSeq(before, seq), { preventScrollReset: true }),
    [setSearch],
  );
  const setDraft = (seq: number, draft: VerdictDraft | null) =>
    setDrafts((before) => {
      const after = new Map(before);
      if (draft === null) after.delete(seq);
      else after.set(seq, draft);
      return after;
    });
  const onTakenBack = ({ seq, body }: { seq: number; body: NewVerdict }) => {
    setDraft(seq, draftOfVerdict(body));
    goTo(seq);
  };
  const verdicts = useGivenVerdicts(group, run, onTakenBack);
  return { verdicts, draftOf: (seq) => drafts.get(seq) ?? EMPTY_DRAFT, setDraft, goTo };
}
