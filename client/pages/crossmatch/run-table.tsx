import { Link } from 'react-router-dom';
import type { RunSummary } from '../../../shared/schemas/run';
import { JobStateChip } from '../../components/job-state-chip';
import { formatCount, formatSepArcsec } from '../../components/quantities';
import { RelativeTime } from '../../components/relative-time';
import { Stamp } from '../../components/stamp';
import { HeadCell } from '../../components/head-cell';

/** Cross-matches in a table; not virtual, because a group makes few. */
export function RunTable({ runs }: { runs: readonly RunSummary[] }) {
  return (
    <div className="overflow-x-auto" tabIndex={0} role="region" aria-label="Cross-matches">
      <table className="w-full border-collapse text-sm">
        <thead>
          <tr className="border-b border-edge text-left text-xs text-muted">
            <HeadCell right>No.</HeadCell>
            <HeadCell>Title</HeadCell>
            <HeadCell>Catalogues</HeadCell>
            <HeadCell right>Radius</HeadCell>
            <HeadCell right>Candidates</HeadCell>
            <HeadCell>State</HeadCell>
            <HeadCell>By</HeadCell>
            <HeadCell>When</HeadCell>
          </tr>
        </thead>
        <tbody>
          {runs.map((run) => (
            <tr key={run.run} className="border-b border-rule align-top">
              <td className="py-2 pr-4 text-right">
                <Link to={String(run.run)} className="text-link" aria-label={`Cross-match ${run.run}`}>
                  {run.run}
                </Link>
              </td>
              <td className="min-w-44 py-2 pr-4">
                <Link to={String(run.run)} className="font-medium text-link" tabIndex={-1}>
                  {run.title === '' ? 'untitled' : run.title}
                </Link>
              </td>
              <td className="py-2 pr-4">
                <span className="flex min-w-32 flex-wrap gap-x-3 gap-y-1">
                  {run.catalogues.map((catalogue) => (
                    <Stamp key={catalogue.label} catalogue={catalogue} withLabel size={20} />
                  ))}
                </span>
              </td>
              <td className="py-2 pr-4 text-right whitespace-nowrap">{formatSepArcsec(run.radiusArcsec)}</td>
              <td className="py-2 pr-4 text-right">
                {run.state === 'done' ? formatCount(run.candidates) : '–'}
              </td>
              <td className="py-2 pr-4">
                <JobStateChip state={run.state} />
              </td>
              <td className="py-2 pr-4">{run.createdBy}</td>
              <td className="py-2 text-muted">
                <RelativeTime at={run.createdAt} />
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
