import { useEffect } from 'react';
import { useLocation, useNavigate, useParams } from 'react-router-dom';
import type { ObjectDetail } from '../../../shared/schemas/object';
import { useGroup } from '../../api/use-group';
import { Coordinates } from '../../components/coordinates';
import { LinkButton } from '../../components/link-button';
import { Loading } from '../../components/loading';
import { MarginNote } from '../../components/margin';
import { Page } from '../../components/page';
import { ProblemNotice } from '../../components/problem-notice';
import { formatSepArcsec } from '../../components/quantities';
import { RelativeTime } from '../../components/relative-time';
import { Ruler } from '../../components/ruler';
import { Section } from '../../components/section';
import { VerdictMark } from '../../components/verdict-mark';
import { FieldSection } from './field-section';
import { MemberSection } from './member-section';
import { NameSection } from './name-section';
import { NoteSection } from './note-section';
import { useObject } from './use-objects';

const SHOWN_EVENTS = 12;

/** One object: chart, names, measurements, notes, verdicts, history. A forwarding number leads to its live object. */
export function ObjectPage() {
  const group = useGroup();
  const number = Number(useParams().number);
  const navigate = useNavigate();
  const answer = useObject(group.slug, number);
  const forwardsTo = answer.data?.state === 'forwarded' ? answer.data.forwardsTo : null;
  useEffect(() => {
    if (forwardsTo !== null) {
      void navigate(`/g/${group.slug}/objects/${forwardsTo}`, { replace: true, state: { forwardedFrom: number } });
    }
  }, [forwardsTo, group.slug, navigate, number]);
  if (answer.isError) {
    return (
      <Page title={`Object ${number}`}>
        <ProblemNotice problem={answer.error} retry={() => void answer.refetch()} />
      </Page>
    );
  }
  if (answer.data?.state !== 'live') {
    return (
      <Page title={`Object ${number}`}>
        <Loading rows={8} label="Loading the object" />
      </Page>
    );
  }
  return <ObjectView group={group.slug} object={answer.data.object} />;
}

function ObjectView({ group, object }: { group: string; object: ObjectDetail }) {
  const state: unknown = useLocation().state;
  const from =
    typeof state === 'object' && state !== null && 'forwardedFrom' in state ? Number(state.forwardedFrom) : null;
  return (
    <Page
      title={`#${object.number} ${object.name}`}
      lead={
        <span className="flex flex-wrap items-center gap-x-4">
          <Coordinates raDeg={object.raDeg} decDeg={object.decDeg} errArcsec={object.errArcsec} copy />
          {object.errArcsec !== null && <span>± {formatSepArcsec(object.errArcsec)}</span>}
        </span>
      }
      margin={<ObjectMargin object={object} />}
    >
      <div className="grid gap-8">
        {from !== null && (
          <p role="status" className="border-l-2 border-accent pl-3">
            #{from} is now part of #{object.number}.
          </p>
        )}
        {object.conflicts > 0 && (
          <p role="alert" className="flex flex-wrap items-center gap-3 border-l-2 border-bad pl-3">
            {object.conflicts} “same” {object.conflicts === 1 ? 'verdict' : 'verdicts'} could not be carried out, because a
            “different” verdict forbids it.
            <LinkButton size="sm" to="../review">
              See the conflicts
            </LinkButton>
          </p>
        )}
        <FieldSection group={group} object={object} />
        <Section title="Separations from the object">
          <Ruler
            label="Separation of each source from the object's position"
            marks={object.members.map((member) => ({
              sepArcsec: member.sepArcsec,
              errArcsec: member.errMajArcsec ?? undefined,
              label: member.designation,
              ordinal: member.ordinal,
            }))}
          />
        </Section>
        <MemberSection group={group} object={object} />
        <NameSection group={group} object={object} />
        <NoteSection group={group} object={object} />
        <VerdictSection object={object} />
      </div>
    </Page>
  );
}

function VerdictSection({ object }: { object: ObjectDetail }) {
  if (object.verdicts.length === 0) return null;
  return (
    <Section title="Verdicts among its sources">
      <ul className="grid gap-1">
        {object.verdicts.map((verdict) => (
          <li key={verdict.id} className="flex flex-wrap items-center gap-x-4 gap-y-1 border-b border-rule py-1">
            <VerdictMark value={verdict.value} grade={verdict.grade} automatic={verdict.origin === 'policy'} />
            <span>
              {verdict.designationA} and {verdict.designationB}
            </span>
            <span className="text-muted">
              {verdict.by}, <RelativeTime at={verdict.at} />
            </span>
            {verdict.remark !== '' && <span className="font-serif">{verdict.remark}</span>}
          </li>
        ))}
      </ul>
    </Section>
  );
}

function ObjectMargin({ object }: { object: ObjectDetail }) {
  return (
    <>
      <MarginNote title="Caution">
        Close positions are evidence, not proof. The position is the error-weighted mean of the sources at their own epochs;
        motions between the epochs are not applied.
      </MarginNote>
      {object.formerNumbers.length > 0 && (
        <MarginNote title="Former numbers">
          {object.formerNumbers.map((number) => `#${number}`).join(', ')} forward to #{object.number}.
        </MarginNote>
      )}
      <MarginNote title="History">
        <ol className="grid gap-2 font-mono text-xs">
          {object.history.slice(0, SHOWN_EVENTS).map((event, i) => (
            <li key={i}>
              <span className="text-muted">
                <RelativeTime at={event.at} /> · {event.by}
              </span>
              <br />
              {event.what}
              <br />
              <span className="break-words text-muted">{event.detail}</span>
            </li>
          ))}
        </ol>
        {object.history.length > SHOWN_EVENTS && (
          <details className="mt-2 font-mono text-xs">
            <summary className="cursor-pointer text-link">{object.history.length - SHOWN_EVENTS} earlier</summary>
            <ol className="mt-2 grid gap-2">
              {object.history.slice(SHOWN_EVENTS).map((event, i) => (
                <li key={i}>
                  <RelativeTime at={event.at} /> {event.by}: {event.what}, {event.detail}
                </li>
              ))}
            </ol>
          </details>
        )}
      </MarginNote>
    </>
  );
}
