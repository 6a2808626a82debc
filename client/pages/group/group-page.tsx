import { useState } from 'react';
import type { Member } from '../../../shared/schemas/group';
import { ROLES } from '../../../shared/words';
import { useSession } from '../../api/session';
import { useGroup } from '../../api/use-group';
import { Button } from '../../components/button';
import { ConfirmDialog } from '../../components/confirm-dialog';
import { Loading } from '../../components/loading';
import { MarginNote } from '../../components/margin';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import { formatBytes, formatCount } from '../../components/quantities';
import { RelativeTime } from '../../components/relative-time';
import { Section } from '../../components/section';
import { AuditList } from './audit-list';
import { NewMemberForm } from './new-member-form';
import { useGroupDetail, useMemberChanges, useMembers } from './use-members';

/** Members and roles, sizes, and the audit trail. */
export function GroupPage() {
  const group = useGroup();
  const detail = useGroupDetail(group.slug);
  const members = useMembers(group.slug);
  return (
    <Page
      title={group.name}
      lead={`Your role here: ${group.role}.`}
      margin={
        <>
          <MarginNote title="Roles">
            Readers look and export. Contributors also import catalogues, give verdicts and write notes. Curators also
            run cross-matches, set policies, merge and split objects. Owners also manage members.
          </MarginNote>
          <MarginNote title="At once">
            A changed role or a removed membership takes effect with the next request of that person.
          </MarginNote>
        </>
      }
    >
      <Section title="What the group holds">
        {detail.isPending && <Loading rows={1} label="Loading the sizes" />}
        {detail.isError && <ProblemNotice problem={detail.error} />}
        {detail.data !== undefined && (
          <p>
            {formatCount(detail.data.catalogues)} catalogues with {formatCount(detail.data.sources)} sources,{' '}
            {formatCount(detail.data.objects)} objects, {formatBytes(detail.data.storedBytes)} of uploaded files.
          </p>
        )}
      </Section>
      <Section title="Members">
        {members.isPending && <Loading rows={4} label="Loading the members" />}
        {members.isError && <ProblemNotice problem={members.error} retry={() => void members.refetch()} />}
        {members.data !== undefined && <MemberTable group={group.slug} members={members.data.items} />}
      </Section>
      {group.can('owner') && (
        <Section title="Add a member">
          <NewMemberForm group={group.slug} />
        </Section>
      )}
      {group.can('curator') && (
        <Section title="Who did what">
          <AuditList group={group.slug} />
        </Section>
      )}
    </Page>
  );
}

function MemberTable({ group, members }: { group: string; members: readonly Member[] }) {
  const { can } = useGroup();
  const me = useSession().person?.id;
  const { change, remove } = useMemberChanges(group);
  const [leaving, setLeaving] = useState<Member | null>(null);
  return (
    <div className="grid gap-3">
      {change.error !== null && <ProblemNotice problem={change.error} />}
      <div className="relative overflow-x-auto" tabIndex={0} role="region" aria-label="Members">
        <table className="w-full border-collapse text-sm">
          <thead>
            <tr className="border-b border-edge text-left text-xs text-muted">
              <th className="py-2 pr-4 font-medium">Name</th>
              <th className="py-2 pr-4 font-medium">E-mail</th>
              <th className="py-2 pr-4 font-medium">Role</th>
              <th className="py-2 pr-4 font-medium">Since</th>
              {can('owner') && <th className="py-2 font-medium">Change</th>}
            </tr>
          </thead>
          <tbody>
            {members.map((one) => (
              <tr key={one.personId} className="border-b border-rule">
                <td className="py-2 pr-4">
                  {one.name}
                  {one.personId === me && <span className="text-muted"> (you)</span>}
                </td>
                <td className="py-2 pr-4">{one.email}</td>
                <td className="py-2 pr-4">
                  {can('owner') ? (
                    <select
                      aria-label={`Role of ${one.name}`}
                      className="min-h-7 rounded-sm border border-edge bg-raised px-1"
                      value={one.role}
                      onChange={(event) => {
                        const role = ROLES.find((each) => each === event.target.value);
                        if (role !== undefined) change.mutate({ personId: one.personId, role });
                      }}
                    >
                      {ROLES.map((role) => (
                        <option key={role}>{role}</option>
                      ))}
                    </select>
                  ) : (
                    one.role
                  )}
                </td>
                <td className="py-2 pr-4 text-muted">
                  <RelativeTime at={one.since} />
                </td>
                {can('owner') && (
                  <td className="py-2">
                    <Button size="sm" onClick={() => setLeaving(one)}>
                      Remove<span className="sr-only"> {one.name}</span>
                    </Button>
                  </td>
                )}
              </tr>
            ))}
          </tbody>
        </table>
      </div>
      <ConfirmDialog
        open={leaving !== null}
        onClose={() => setLeaving(null)}
        title={`Remove ${leaving?.name ?? ''}?`}
        confirmLabel="Remove"
        busy={remove.isPending}
        problem={remove.error}
        onConfirm={() => {
          if (leaving !== null) remove.mutate(leaving.personId, { onSuccess: () => setLeaving(null) });
        }}
      >
        One membership ends. Verdicts, notes and imports of this person stay, under their name.
      </ConfirmDialog>
    </div>
  );
}
