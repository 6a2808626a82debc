import { useCallback, useMemo, useState, type ReactNode } from 'react';
import { useQueryClient } from '@tanstack/react-query';
import type { PolicyCount, PolicyRule, RunDetail } from '../../../shared/schemas/run';
import { useGroup } from '../../api/use-group';
import { Button } from '../../components/button';
import { ConfirmDialog } from '../../components/confirm-dialog';
import { JobCard } from '../../components/job-card';
import { ProblemNotice } from '../../components/problem-notice';
import { formatCount, plural } from '../../components/quantities';
import { Section } from '../../components/section';
import { useDebounced } from '../../components/use-debounced';
import { AppliedPolicies } from './applied-policies';
import { PolicyForm } from './policy-form';
import { ruleOfDraft, type RuleDraft } from './policy-rule';
import { ruleText } from '../../components/run-words';
import { refreshAfterVerdicts, useApplyPolicy, useOpenPolicyJob, usePolicyCount } from '../../api/runs';

const COUNT_WAIT_MS = 250;

/** The rule for clear cases: what it would decide, live, and what rules have decided so far. */
export function PolicyPanel({
  run,
  draft,
  onDraft,
}: {
  run: RunDetail;
  draft: RuleDraft;
  onDraft: (draft: RuleDraft) => void;
}) {
  const group = useGroup();
  const client = useQueryClient();
  const [startedJob, setStartedJob] = useState<string | null>(null);
  const openJob = useOpenPolicyJob(group.slug, run.run);
  const onFinished = useCallback(() => void refreshAfterVerdicts(client, group.slug), [client, group.slug]);
  const jobId = openJob ?? startedJob;
  return (
    <Section title="Policy for clear cases">
      {jobId !== null && <JobCard key={jobId} group={group.slug} jobId={jobId} onFinished={onFinished} />}
      {group.can('curator') ? (
        <RuleWithCount
          run={run}
          draft={draft}
          onDraft={onDraft}
          busy={openJob !== null}
          onStarted={setStartedJob}
        />
      ) : (
        <p className="max-w-prose text-muted">
          A curator can let a rule decide the clear cases of this cross-match. You are a {group.role}: you see
          what rules have decided.
        </p>
      )}
      <AppliedPolicies run={run} busy={openJob !== null} onStarted={setStartedJob} />
    </Section>
  );
}

function RuleWithCount({
  run,
  draft,
  onDraft,
  busy,
  onStarted,
}: {
  run: RunDetail;
  draft: RuleDraft;
  onDraft: (draft: RuleDraft) => void;
  /** A policy is at work on this run. */
  busy: boolean;
  onStarted: (jobId: string) => void;
}) {
  const { slug } = useGroup();
  const rule = useMemo(() => ruleOfDraft(draft), [draft]);
  const settled = useDebounced(rule, COUNT_WAIT_MS);
  const count = usePolicyCount(slug, run.run, settled);
  const apply = useApplyPolicy(slug, run.run);
  const [asking, setAsking] = useState(false);
  // Numbers of an earlier rule stay in sight, but nobody may agree to them.
  const current = rule !== null && rule === settled && !count.isPlaceholderData && !count.isFetching;
  const confirm = (chosen: PolicyRule) =>
    apply.mutate(chosen, {
      onSuccess: ({ jobId }) => {
        setAsking(false);
        onStarted(jobId);
      },
    });
  return (
    <div className="grid gap-6 sm:grid-cols-2">
      <PolicyForm draft={draft} onDraft={onDraft} radiusArcsec={run.radiusArcsec} />
      <div className="grid content-start gap-3">
        <h3 className="font-medium">What it would decide</h3>
        {rule === null && <p className="text-muted">Write a separation first.</p>}
        {rule !== null && count.isError && (
          <ProblemNotice problem={count.error} retry={() => void count.refetch()} />
        )}
        {rule !== null && count.data !== undefined && !count.isError && (
          <CountFigures count={count.data} stale={!current} />
        )}
        {rule !== null && count.isPending && !count.isError && <p className="text-muted">Counting…</p>}
        <div className="flex flex-wrap items-center gap-3">
          <Button
            kind="main"
            disabled={!current || busy || count.data === undefined || count.data.automatic === 0}
            onClick={() => {
              apply.reset();
              setAsking(true);
            }}
          >
            Apply
          </Button>
          {busy && <span className="text-muted">A policy is at work; wait until it has ended.</span>}
          {!busy && current && count.data?.automatic === 0 && (
            <span className="text-muted">This rule decides nothing that is still open.</span>
          )}
        </div>
      </div>
      {rule !== null && count.data !== undefined && (
        <ConfirmDialog
          open={asking}
          onClose={() => setAsking(false)}
          title={`Give ${plural(count.data.automatic, 'automatic verdict', 'automatic verdicts')}?`}
          confirmLabel={`Give ${plural(count.data.automatic, 'verdict', 'verdicts')}`}
          kind="main"
          busy={apply.isPending}
          problem={apply.error}
          onConfirm={() => confirm(rule)}
        >
          <ConfirmText rule={rule} count={count.data} />
        </ConfirmDialog>
      )}
    </div>
  );
}

function CountFigures({ count, stale }: { count: PolicyCount; stale: boolean }) {
  return (
    <dl
      className={
        stale
          ? 'grid grid-cols-[auto_1fr] gap-x-3 gap-y-1 opacity-60'
          : 'grid grid-cols-[auto_1fr] gap-x-3 gap-y-1'
      }
      aria-busy={stale || undefined}
      aria-live="polite"
    >
      <Figure value={count.automatic}>become automatic verdicts &lsquo;same&rsquo;</Figure>
      <Figure value={count.toReview}>stay for people</Figure>
      <Figure value={count.conflicts}>
        of those fit the rule, but would join what a &lsquo;different&rsquo; verdict keeps apart
      </Figure>
      <Figure value={count.alreadyDecided}>fit the rule and are decided already: left alone</Figure>
    </dl>
  );
}

function Figure({ value, children }: { value: number; children: ReactNode }) {
  return (
    <>
      <dd className="text-right text-base font-bold">{formatCount(value)}</dd>
      <dt className="self-center">{children}</dt>
    </>
  );
}

function ConfirmText({ rule, count }: { rule: PolicyRule; count: PolicyCount }) {
  return (
    <>
      <p>
        Rule: {ruleText(rule)}. {plural(count.automatic, 'candidate becomes', 'candidates become')}{' '}
        &lsquo;same&rsquo;, shown as automatic; the objects are merged.
      </p>
      <p>
        {plural(count.toReview, 'candidate stays', 'candidates stay')} for people
        {count.conflicts > 0 &&
          `, among them ${formatCount(count.conflicts)} that would join what a ‘different’ verdict keeps apart`}
        . {plural(count.alreadyDecided, 'verdict', 'verdicts')} in force on fitting candidates{' '}
        {count.alreadyDecided === 1 ? 'is' : 'are'} left alone.
      </p>
      <p>The whole policy can be taken back at any time.</p>
    </>
  );
}
