import type { ReactNode } from 'react';
import { Link } from 'react-router-dom';
import { asProblem } from '../../api/problem-error';
import { useGroup } from '../../api/use-group';
import { Button } from '../../components/button';
import { classNames } from '../../components/class-names';
import { plural } from '../../components/quantities';
import { VerdictMark } from '../../components/verdict-mark';
import { needsAttention, type Given } from './given-verdicts';
import type { useGivenVerdicts } from './use-desk';

/** What became of the verdicts given here: the last one, and those that failed or were not carried out. */
export function GivenStrip({
  verdicts,
  goTo,
}: {
  verdicts: ReturnType<typeof useGivenVerdicts>;
  goTo: (seq: number) => void;
}) {
  const mayDecide = useGroup().can('contributor');
  const { given } = verdicts;
  const last = given.at(-1);
  const shown = given.filter((one) => one === last || needsAttention(one));
  return (
    <div role="status" className="screen-only grid gap-1.5 empty:hidden">
      {/* Holds the place of the first verdict, so that the chart does not move when it is given. */}
      {mayDecide && shown.length === 0 && (
        <p className="border-l-4 border-rule px-3 py-1.5 text-muted">
          What becomes of the verdicts that you give here is said in this line.
        </p>
      )}
      {shown.map((one) => (
        <div
          key={one.id}
          className={classNames(
            'flex flex-wrap items-center gap-x-4 gap-y-1 border-l-4 bg-raised px-3 py-1.5',
            one.state === 'failed' || one.state === 'not taken back'
              ? 'border-bad'
              : one.result?.conflict === true
                ? 'border-warn'
                : 'border-good',
          )}
        >
          <button
            type="button"
            className="text-link underline underline-offset-4"
            onClick={() => goTo(one.seq)}
            aria-label={`Go to candidate ${one.seq}`}
          >
            {one.seq}
          </button>
          <VerdictMark value={one.body.value} grade={one.body.grade} />
          <span className="min-w-0">
            <Outcome given={one} />
          </span>
          {one.state === 'failed' && (
            <Button size="sm" onClick={() => verdicts.giveAgain(one.id)}>
              Send again
            </Button>
          )}
          {needsAttention(one) && (
            <Button size="sm" kind="quiet" onClick={() => verdicts.dismiss(one.id)}>
              Put away
            </Button>
          )}
          {one === last && given.length > 1 && (
            <span className="ml-auto text-muted">
              {plural(given.length, 'verdict', 'verdicts')} given here
            </span>
          )}
        </div>
      ))}
    </div>
  );
}

function Outcome({ given }: { given: Given }): ReactNode {
  const { state, result, problem, body } = given;
  if (state === 'saving') return <span className="text-muted">is being saved…</span>;
  if (state === 'taking back') return <span className="text-muted">is being taken back…</span>;
  if (state === 'failed' || state === 'not taken back') {
    const { detail, hint } = asProblem(problem);
    return (
      <>
        <strong className="text-bad">{state === 'failed' ? 'not saved' : 'not taken back'}</strong>: {detail}{' '}
        {hint}
      </>
    );
  }
  if (result === null) return null;
  if (result.conflict)
    return <ConflictText value={body.value} objectA={result.objectA} objectB={result.objectB} />;
  if (result.objectA === result.objectB) {
    return (
      <>
        saved; both are <ObjectLink number={result.objectA} />
      </>
    );
  }
  return (
    <>
      saved; <ObjectLink number={result.objectA} /> and <ObjectLink number={result.objectB} />
    </>
  );
}

function ConflictText({ value, objectA, objectB }: { value: string; objectA: number; objectB: number }) {
  const { slug } = useGroup();
  return (
    <>
      <strong className="text-warn">saved, in conflict</strong>:{' '}
      {value === 'same'
        ? 'it would join sources that a ‘different’ verdict keeps apart, so it is not carried out.'
        : 'a ‘same’ verdict joins these two through others; that one is no longer carried out.'}{' '}
      {objectA === objectB ? (
        <>
          Both stay in <ObjectLink number={objectA} />.
        </>
      ) : (
        <>
          They stay <ObjectLink number={objectA} /> and <ObjectLink number={objectB} />.
        </>
      )}{' '}
      It waits among the <Link to={`/g/${slug}/review#conflicts`}>conflicts</Link> until one of the two is
      taken back.
    </>
  );
}

function ObjectLink({ number }: { number: number }) {
  const { slug } = useGroup();
  return <Link to={`/g/${slug}/objects/${number}`}>object {number}</Link>;
}
