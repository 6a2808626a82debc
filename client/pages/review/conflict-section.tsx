import { useState } from 'react';
import type { Conflict } from '../../../shared/schemas/verdict';
import { useGroup } from '../../api/use-group';
import { ConfirmDialog } from '../../components/confirm-dialog';
import { Loading } from '../../components/loading';
import { ProblemNotice } from '../../components/problem-notice';
import { formatCount } from '../../components/quantities';
import { Section } from '../../components/section';
import { ConflictItem } from './conflict-item';
import { sourceName } from './source-name';
import { useConflicts, useTakeBackVerdict } from './use-review';

/** Which of the two verdicts of a conflict is to go. */
export interface Withdrawal {
  conflict: Conflict;
  value: 'same' | 'different';
}

/** Verdicts 'same' that are not carried out, with what forbids each. */
export function ConflictSection() {
  const { slug } = useGroup();
  const conflicts = useConflicts(slug);
  const takeBack = useTakeBackVerdict(slug);
  const [asked, setAsked] = useState<Withdrawal | null>(null);
  const { items = [], total = 0 } = conflicts.data ?? {};
  return (
    <Section title={`Conflicts${total > 0 ? ` (${formatCount(total)})` : ''}`} id="conflicts">
      {conflicts.isPending && <Loading rows={3} label="Loading the conflicts" />}
      {conflicts.isError && (
        <ProblemNotice problem={conflicts.error} retry={() => void conflicts.refetch()} />
      )}
      {conflicts.isSuccess && total === 0 && (
        <p className="text-muted">None: every &lsquo;same&rsquo; verdict in force is carried out.</p>
      )}
      {items.length < total && (
        <p className="text-muted">
          The first {formatCount(items.length)} are shown; the others follow as these are settled.
        </p>
      )}
      <ul className="grid gap-3">
        {items.map((conflict) => (
          <ConflictItem
            key={conflict.sameVerdictId}
            conflict={conflict}
            onTakeBack={(value) => {
              takeBack.reset();
              setAsked({ conflict, value });
            }}
          />
        ))}
      </ul>
      <ConfirmDialog
        open={asked !== null}
        onClose={() => setAsked(null)}
        title={`Take the ‘${asked?.value ?? 'same'}’ verdict back?`}
        confirmLabel="Take it back"
        busy={takeBack.isPending}
        problem={takeBack.error}
        onConfirm={() => {
          if (asked === null) return;
          const { conflict, value } = asked;
          takeBack.mutate(value === 'same' ? conflict.sameVerdictId : conflict.differentVerdictId, {
            onSuccess: () => setAsked(null),
          });
        }}
      >
        {asked !== null && <WithdrawalText {...asked} />}
      </ConfirmDialog>
    </Section>
  );
}

function WithdrawalText({ conflict, value }: Withdrawal) {
  const { a, b, forbiddenA, forbiddenB } = conflict;
  const [one, other] = value === 'same' ? [a, b] : [forbiddenA, forbiddenB];
  return (
    <p>
      One verdict on {sourceName(one)} and {sourceName(other)} loses its force; it stays in the log.{' '}
      {value === 'same'
        ? 'No object changes, because it was not carried out.'
        : 'The ‘same’ verdict is then carried out, if nothing else forbids it, and objects are merged.'}
    </p>
  );
}
