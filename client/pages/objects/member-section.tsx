import { useState } from 'react';
import { Link } from 'react-router-dom';
import type { ObjectDetail, ObjectMember } from '../../../shared/schemas/object';
import { useGroup } from '../../api/use-group';
import { Button } from '../../components/button';
import { ConfirmDialog } from '../../components/confirm-dialog';
import { Coordinates } from '../../components/coordinates';
import { formatSepArcsec } from '../../components/quantities';
import { Section } from '../../components/section';
import { Stamp } from '../../components/stamp';
import { TextField } from '../../components/text-field';
import { useObjectChanges } from './use-objects';

/** The sources of the object with their measurements; curators take some out here. */
export function MemberSection({ group, object }: { group: string; object: ObjectDetail }) {
  const { can } = useGroup();
  const [leaving, setLeaving] = useState<ReadonlySet<number>>(new Set());
  const [asking, setAsking] = useState(false);
  const maySplit = can('curator') && object.members.length > 1;
  const toggle = (entryId: number) => {
    const next = new Set(leaving);
    if (!next.delete(entryId)) next.add(entryId);
    setLeaving(next);
  };
  return (
    <Section
      title="Sources and measurements"
      actions={
        leaving.size > 0 &&
        leaving.size < object.members.length && (
          <Button size="sm" onClick={() => setAsking(true)}>
            Take {leaving.size} out
          </Button>
        )
      }
    >
      <ul className="grid gap-4">
        {object.members.map((member) => (
          <Member
            key={member.entryId}
            member={member}
            leaving={maySplit ? leaving.has(member.entryId) : null}
            onLeave={() => toggle(member.entryId)}
          />
        ))}
      </ul>
      <SplitDialog
        group={group}
        object={object}
        entryIds={[...leaving]}
        open={asking}
        onClose={() => setAsking(false)}
        onSplit={() => setLeaving(new Set())}
      />
    </Section>
  );
}

function Member({ member, leaving, onLeave }: { member: ObjectMember; leaving: boolean | null; onLeave: () => void }) {
  return (
    <li className="grid gap-2 border-b border-rule pb-3">
      <div className="flex flex-wrap items-center gap-x-4 gap-y-1">
        {leaving !== null && (
          <input
            type="checkbox"
            className="screen-only size-4"
            aria-label={`Take ${member.designation} out`}
            checked={leaving}
            onChange={onLeave}
          />
        )}
        <Stamp catalogue={{ label: member.catalogue, ordinal: member.ordinal }} />
        <span className="font-medium">{member.designation}</span>
        <Link to={`../catalogues/${member.catalogue}?text=${encodeURIComponent(member.designation)}`} className="text-link">
          {member.catalogue} row {member.rowNo}
        </Link>
        <Coordinates raDeg={member.raDeg} decDeg={member.decDeg} errArcsec={member.errMajArcsec} />
        <span className="text-muted">
          {errorText(member)}, {formatSepArcsec(member.sepArcsec)} from the object
          {member.epochYear !== null && `, epoch ${member.epochYear.toFixed(1)}`}
        </span>
      </div>
      {member.measurements.length > 0 && (
        <dl className="flex flex-wrap gap-x-6 gap-y-1">
          {member.measurements.map((one, i) => (
            <div key={i} className="flex gap-2">
              <dt className="text-muted">{one.quantity}</dt>
              <dd>
                {one.value}
                {one.error !== null && ` ± ${one.error}`} {one.unit}
              </dd>
            </div>
          ))}
        </dl>
      )}
      <details>
        <summary className="cursor-pointer text-link">The row as written</summary>
        <dl className="mt-2 grid gap-x-6 gap-y-1 sm:grid-cols-2 wide:grid-cols-3">
          {member.columns.map((column, i) => (
            <div key={i} className="flex min-w-0 gap-2">
              <dt className="shrink-0 text-muted">{column.name}</dt>
              <dd className="break-all">{column.cell === '' ? '—' : column.cell}</dd>
            </div>
          ))}
        </dl>
      </details>
    </li>
  );
}

function errorText({ errMajArcsec, errMinArcsec }: ObjectMember): string {
  if (errMajArcsec === null || errMinArcsec === null) return 'no error stated';
  if (errMajArcsec === errMinArcsec) return `± ${formatSepArcsec(errMajArcsec)}`;
  return `± ${formatSepArcsec(errMajArcsec)} × ${formatSepArcsec(errMinArcsec)}`;
}

function SplitDialog({
  group,
  object,
  entryIds,
  open,
  onClose,
  onSplit,
}: {
  group: string;
  object: ObjectDetail;
  entryIds: readonly number[];
  open: boolean;
  onClose: () => void;
  onSplit: () => void;
}) {
  const { split } = useObjectChanges(group, object.number);
  const [remark, setRemark] = useState('');
  const names = object.members.filter((member) => entryIds.includes(member.entryId)).map((member) => member.designation);
  return (
    <ConfirmDialog
      open={open}
      onClose={onClose}
      kind="main"
      title={`Take ${names.length} of ${object.members.length} sources out?`}
      confirmLabel="Take out"
      busy={split.isPending}
      problem={split.error}
      onConfirm={() =>
        split.mutate(
          { entryIds: [...entryIds], remark },
          {
            onSuccess: () => {
              onSplit();
              onClose();
            },
          },
        )
      }
    >
      <div className="grid gap-3">
        <p>
          {names.join(', ')} will stand under an object of {names.length === 1 ? 'its' : 'their'} own again, with the lowest
          number born with {names.length === 1 ? 'it' : 'them'}. “Same” verdicts across are taken back and “different” ones
          written in your name; notes and names stay with the number they were given on.
        </p>
        <TextField label="Why" value={remark} onChange={(event) => setRemark(event.target.value)} />
      </div>
    </ConfirmDialog>
  );
}
