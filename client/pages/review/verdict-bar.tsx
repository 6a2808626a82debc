import { VERDICT_VALUES, type VerdictValue } from '../../../shared/words';
import { useGroup } from '../../api/use-group';
import { Button } from '../../components/button';
import { VerdictSign } from '../../components/verdict-mark';
import { keyOfAct, type DeskAct } from './desk-keys';

const WORDS: Record<VerdictValue, string> = { same: 'Same', different: 'Different', unsure: 'Unsure' };

/** The three verdicts and the ways through the queue; at the foot of the screen where it is narrow. */
export function VerdictBar({
  mayDecide,
  busy,
  canUndo,
  atStart,
  atEnd,
  onAct,
}: {
  mayDecide: boolean;
  /** A verdict on this candidate is on its way. */
  busy: boolean;
  canUndo: boolean;
  atStart: boolean;
  atEnd: boolean;
  onAct: (act: DeskAct) => void;
}) {
  const { role } = useGroup();
  return (
    <div
      role="group"
      aria-label="Verdict"
      className="screen-only sticky bottom-0 z-20 order-last -mx-4 grid content-start gap-2 border-t border-edge bg-page px-4 py-3 sm:mx-0 sm:px-0 wide:static wide:order-none wide:border-t-0 wide:py-0"
    >
      {!mayDecide && (
        <p className="text-muted">
          You are a {role}: you see everything here but give no verdicts. An owner of the group can change
          your role.
        </p>
      )}
      <div className="grid grid-cols-3 gap-2 wide:grid-cols-1">
        {VERDICT_VALUES.map((value) => (
          <Button
            key={value}
            disabled={!mayDecide || busy}
            onClick={() => onAct({ kind: 'verdict', value })}
            className="min-h-11 min-w-0 justify-center! px-1.5! sm:justify-between! sm:px-3!"
          >
            <span className="inline-flex min-w-0 items-center gap-1.5 sm:gap-2">
              <VerdictSign value={value} />
              {WORDS[value]}
            </span>
            <KeySign act={{ kind: 'verdict', value }} />
          </Button>
        ))}
      </div>
      <div className="grid grid-cols-3 gap-2">
        <Button disabled={atStart} onClick={() => onAct({ kind: 'back' })}>
          Back <KeySign act={{ kind: 'back' }} />
        </Button>
        <Button onClick={() => onAct({ kind: 'next' })}>
          {atEnd ? 'First' : 'Next'} <KeySign act={{ kind: 'next' }} />
        </Button>
        <Button disabled={!mayDecide || !canUndo} onClick={() => onAct({ kind: 'undo' })}>
          Undo <KeySign act={{ kind: 'undo' }} />
        </Button>
      </div>
    </div>
  );
}

/** The key of a button; not where there is hardly room and no keyboard. */
export function KeySign({ act }: { act: DeskAct }) {
  return (
    <kbd
      aria-hidden="true"
      className="hidden min-w-5 rounded-sm border border-edge px-1 text-center text-xs text-muted sm:inline-block"
    >
      {keyOfAct(act).toUpperCase()}
    </kbd>
  );
}
