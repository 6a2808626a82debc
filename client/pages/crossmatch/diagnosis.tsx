import { useState } from 'react';
import type { RunDetail } from '../../../shared/schemas/run';
import { TabPanel, Tabs } from '../../components/tabs';
import { useUrlChoice } from '../../components/use-url-choice';
import { PairDiagnosis } from './pair-diagnosis';
import { PolicyPanel } from './policy-panel';
import { draftSepArcsec, proposedSepArcsec, roundedSep, type RuleDraft } from './policy-rule';
import { pairId, pairName } from '../../components/run-words';

/** The separations of a run, and the rule whose limit is drawn on them. */
export function Diagnosis({ run }: { run: RunDetail }) {
  const [draft, setDraft] = useState<RuleDraft>(() => ({
    maxSepText: String(proposedSepArcsec(run.pairs, run.radiusArcsec)),
    mutualBest: true,
    noRival: true,
    grade: 'probable',
  }));
  const ids = run.pairs.map(pairId);
  const [shown, setShown] = useUrlChoice('show', ids, ids[0] ?? '');
  const limitArcsec = draftSepArcsec(draft);
  const onLimit = (sepArcsec: number) =>
    setDraft((before) => ({ ...before, maxSepText: String(roundedSep(sepArcsec)) }));
  return (
    <div className="grid min-w-0 gap-8">
      <div className="min-w-0">
        {run.pairs.length > 1 && (
          <Tabs
            label="Pairs of catalogues"
            current={shown}
            onChange={setShown}
            tabs={run.pairs.map((pair) => ({
              id: pairId(pair),
              label: pairName(pair),
              count: pair.candidates,
            }))}
          />
        )}
        {run.pairs.map((pair) => {
          const diagnosis = (
            <PairDiagnosis
              pair={pair}
              radiusArcsec={run.radiusArcsec}
              limitArcsec={limitArcsec}
              onLimitChange={onLimit}
            />
          );
          if (run.pairs.length === 1) return <div key={pairId(pair)}>{diagnosis}</div>;
          return (
            <TabPanel key={pairId(pair)} id={pairId(pair)} current={shown}>
              {diagnosis}
            </TabPanel>
          );
        })}
      </div>
      <PolicyPanel run={run} draft={draft} onDraft={setDraft} />
    </div>
  );
}
