import { auditEvent } from '../../../shared/schemas/group';
import { pageOf } from '../../../shared/schemas/page';
import { usePaged } from '../../api/paged';
import { keys } from '../../api/query-keys';
import { groupPath } from '../../api/request';
import { Button } from '../../components/button';
import { EmptyState } from '../../components/empty-state';
import { Loading } from '../../components/loading';
import { ProblemNotice } from '../../components/problem-notice';
import { RelativeTime } from '../../components/relative-time';

const auditPage = pageOf(auditEvent);
const PAGE_EVENTS = 30;

/** The group's audit trail, the newest first. */
export function AuditList({ group }: { group: string }) {
  const list = usePaged({
    queryKey: keys.audit(group),
    path: groupPath(group, 'audit'),
    answer: auditPage,
    limit: PAGE_EVENTS,
  });
  if (list.problem !== null) return <ProblemNotice problem={list.problem} retry={list.retry} />;
  if (list.isLoading) return <Loading rows={4} label="Loading the audit trail" />;
  if (list.rows.length === 0) return <EmptyState title="Nothing yet">Every change will be listed here.</EmptyState>;
  return (
    <div className="grid gap-3">
      <ol className="grid gap-1">
        {list.rows.map((event) => (
          <li key={event.id} className="grid gap-x-4 border-b border-rule py-1 sm:grid-cols-[9rem_1fr]">
            <span className="text-muted">
              <RelativeTime at={event.at} />
            </span>
            <span>
              {event.person ?? 'the system'}: {event.action} <span className="text-muted">({event.subject})</span>
            </span>
          </li>
        ))}
      </ol>
      {list.hasMore && (
        <div>
          <Button size="sm" onClick={list.loadMore} busy={list.isLoadingMore}>
            Earlier
          </Button>
        </div>
      )}
    </div>
  );
}
