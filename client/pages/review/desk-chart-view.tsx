import { memo, useMemo } from 'react';
import type { DeskTask } from '../../../shared/schemas/run';
import { FindingChart } from '../../charts/finding-chart';
import { formatSepArcsec } from '../../components/quantities';
import { chartRadiusArcsec, chartSources, seqOfSource } from './desk-chart';

/** The finding chart of a candidate; not drawn again while a remark is typed beside it. */
export const DeskChart = memo(function DeskChart({
  task,
  runRadiusArcsec,
  goTo,
}: {
  task: DeskTask;
  runRadiusArcsec: number;
  goTo: (seq: number) => void;
}) {
  const { a, b } = task.candidate;
  const sources = useMemo(() => chartSources(task), [task]);
  return (
    <FindingChart
      title={`Field of ${a.designation} and ${b.designation}`}
      centre={a}
      radiusArcsec={chartRadiusArcsec(task.fieldRadiusArcsec, runRadiusArcsec)}
      sources={sources}
      circle={{ radiusArcsec: runRadiusArcsec, label: `radius ${formatSepArcsec(runRadiusArcsec)} around A` }}
      onChoose={(source) => {
        const chosen = seqOfSource(task.others, source.id);
        if (chosen !== null) goTo(chosen);
      }}
    />
  );
});
