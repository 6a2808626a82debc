import { useState } from 'react';
import type { RunDetail } from '../../../shared/schemas/run';
import { useGroup } from '../../api/use-group';
import { Button } from '../../components/button';
import { ConfirmDialog } from '../../components/confirm-dialog';
import { plural } from '../../components/quantities';
import { RelativeTime } from '../../components/relative-time';
import { StatusChip } from '../../components/status-chip';
import { ruleText } from '../../components/run-words';
import { useTakeBackPolicy } from '../../api/runs';

type Policy = RunDetail['policies'][number];

/** Policies that gave verdicts on a run, each of which can be taken back as a whole. */
export function AppliedPolicies({
  run,
  busy,
  onStarted,
}: {
  run: RunDetail;
  busy: boolean;
  onStarted: (jobId: string) => void;
}) {
  const group = useGroup();
  const takeBack = useTakeBackPolicy(group.slug, run.run);
  const [asked, setAsked] = useState<Policy | null>(null);
  if (run.policies.length === 0) return <p className="text-muted">No policy has been applied here yet.</p>;
  return (
    <div className="grid gap-2">
      <h3 className="font-medium">Applied so far</h3>
      <ul className="grid">
        {run.policies.map((policy) => (
          <li
            key={policy.id}
            className="flex flex-wrap items-center justify-between gap-x-4 gap-y-1 border-b border-rule py-2"
          >
            <span className="grid min-w-0 gap-0.5">
              <span>
                {ruleText(policy.rule)}: <strong>{plural(policy.verdicts, 'verdict', 'verdicts')}</strong>
              </span>
              <span className="text-muted">
                {policy.by}, <RelativeTime at={policy.at} />
              </span>
            </span>
            {policy.takenBackAt !== null ? (
              <StatusChip icon="↶">
                taken back <RelativeTime at={policy.takenBackAt} />
              </StatusChip>
            ) : (
              group.can('curator') && (
                <Button
                  size="sm"
                  kind="bad"
                  disabled={busy}
                  aria-label={`Take back the policy: ${ruleText(policy.rule)}`}
                  onClick={() => {
                    takeBack.reset();
                    setAsked(policy);
                  }}
                >
                  Take back
                </Button>
              )
            )}
          </li>
        ))}
      </ul>
      <ConfirmDialog
        open={asked !== null}
        onClose={() => setAsked(null)}
        title="Take the whole policy back?"
        confirmLabel={`Take back ${plural(asked?.verdicts ?? 0, 'verdict', 'verdicts')}`}
        busy={takeBack.isPending}
        problem={takeBack.error}
        onConfirm={() => {
          if (asked === null) return;
          takeBack.mutate(asked.id, {
            onSuccess: ({ jobId }) => {
              setAsked(null);
              onStarted(jobId);
            },
          });
        }}
      >
        <p>
          Up to {plural(asked?.verdicts ?? 0, 'automatic verdict loses its', 'automatic verdicts lose their')}{' '}
          force: all that nobody has overruled since. Objects that only these verdicts hold together come
          apart. Verdicts of people stay. The policy can be applied again.
        </p>
      </ConfirmDialog>
    </div>
  );
}
