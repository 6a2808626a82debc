import { useState } from 'react';
import type { Alias, ObjectDetail } from '../../../shared/schemas/object';
import { asProblem } from '../../api/problem-error';
import { useSession } from '../../api/session';
import { useGroup } from '../../api/use-group';
import { Button } from '../../components/button';
import { ProblemNotice } from '../../components/problem-notice';
import { RelativeTime } from '../../components/relative-time';
import { Section } from '../../components/section';
import { StatusChip } from '../../components/status-chip';
import { TextField } from '../../components/text-field';
import { useObjectChanges } from './use-objects';

/** All names of the object, each with where it came from. */
export function NameSection({ group, object }: { group: string; object: ObjectDetail }) {
  const { can } = useGroup();
  const { addName, rename, retireName } = useObjectChanges(group, object.number);
  const [name, setName] = useState('');
  const problem = rename.error ?? retireName.error;
  const stale = problem !== null && asProblem(problem).code === 'stale-version';
  return (
    <Section title="Names">
      <div className="grid gap-4">
        {stale && (
          <p role="alert" className="border-l-2 border-warn pl-3">
            Somebody changed the object in the meantime; this is its present state. Choose again if you still want to.
          </p>
        )}
        {problem !== null && !stale && <ProblemNotice problem={problem} />}
        <ul className="grid gap-1">
          {object.aliases.map((alias) => (
            <li key={alias.id} className="flex flex-wrap items-center gap-x-4 gap-y-1 border-b border-rule py-1">
              <span className={alias.retiredAt === null ? 'font-medium' : 'text-muted line-through'}>{alias.name}</span>
              <span className="text-muted">
                {alias.origin === 'entry' ? `from ${alias.from}` : `given by ${alias.from}`},{' '}
                <RelativeTime at={alias.at} />
              </span>
              {alias.name === object.name && <StatusChip tone="good">preferred</StatusChip>}
              {alias.contested && <StatusChip tone="warn">contested: another object bears it too</StatusChip>}
              {alias.retiredAt !== null && <StatusChip tone="plain">retired</StatusChip>}
              <AliasActions
                alias={alias}
                preferred={alias.name === object.name}
                onPrefer={() => rename.mutate({ name: alias.name, version: object.version })}
                onRetire={() => retireName.mutate(alias.id)}
              />
            </li>
          ))}
        </ul>
        {can('contributor') && (
          <form
            className="screen-only flex flex-wrap items-end gap-3"
            onSubmit={(event) => {
              event.preventDefault();
              addName.mutate(name, { onSuccess: () => setName('') });
            }}
          >
            <div className="w-72 max-w-full">
              <TextField label="A further name" value={name} onChange={(event) => setName(event.target.value)} />
            </div>
            <Button type="submit" busy={addName.isPending} disabled={name.trim() === ''}>
              Add
            </Button>
            {addName.error !== null && <ProblemNotice problem={addName.error} />}
          </form>
        )}
      </div>
    </Section>
  );
}

function AliasActions({
  alias,
  preferred,
  onPrefer,
  onRetire,
}: {
  alias: Alias;
  preferred: boolean;
  onPrefer: () => void;
  onRetire: () => void;
}) {
  const { can } = useGroup();
  const me = useSession().person?.name;
  if (alias.retiredAt !== null) return null;
  const mayRetire = can('curator') || (can('contributor') && alias.origin === 'person' && alias.from === me);
  return (
    <span className="screen-only ml-auto flex gap-2">
      {can('curator') && !preferred && (
        <Button size="sm" kind="quiet" onClick={onPrefer}>
          Prefer<span className="sr-only"> {alias.name}</span>
        </Button>
      )}
      {mayRetire && (
        <Button size="sm" kind="quiet" onClick={onRetire}>
          Retire<span className="sr-only"> {alias.name}</span>
        </Button>
      )}
    </span>
  );
}
