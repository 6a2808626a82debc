import type { RefObject } from 'react';
import { FLAGS, GRADES, type Grade } from '../../../shared/words';
import { TextAreaField } from '../../components/text-area-field';
import { classNames } from '../../components/class-names';
import { KeySign } from './verdict-bar';
import { withFlag, type VerdictDraft } from './verdict-draft';

const MOST_REMARK = 2000;

/** Grade, flags and remark that go with the next verdict on this candidate. */
export function VerdictDetails({
  mayDecide,
  draft,
  onDraft,
  onGrade,
  remarkRef,
}: {
  mayDecide: boolean;
  draft: VerdictDraft;
  onDraft: (draft: VerdictDraft) => void;
  onGrade: (grade: Grade) => void;
  remarkRef: RefObject<HTMLTextAreaElement | null>;
}) {
  if (!mayDecide) return null;
  return (
    <div className="screen-only grid content-start gap-4">
      <fieldset>
        <legend className="mb-1.5 font-medium">
          Grade <span className="font-normal text-muted">optional, before the verdict</span>
        </legend>
        <div className="flex flex-wrap gap-1.5">
          {GRADES.map((grade) => (
            <Toggle key={grade} on={draft.grade === grade} onPress={() => onGrade(grade)}>
              {grade}
              <KeySign act={{ kind: 'grade', grade }} />
            </Toggle>
          ))}
        </div>
      </fieldset>
      <fieldset>
        <legend className="mb-1.5 font-medium">Flags</legend>
        <div className="flex flex-wrap gap-1.5">
          {FLAGS.map((flag) => (
            <Toggle key={flag} on={draft.flags.includes(flag)} onPress={() => onDraft(withFlag(draft, flag))}>
              {flag}
            </Toggle>
          ))}
        </div>
      </fieldset>
      <TextAreaField
        label={
          <span className="inline-flex items-center gap-2">
            Remark <KeySign act={{ kind: 'remark' }} />
          </span>
        }
        ref={remarkRef}
        rows={2}
        maxLength={MOST_REMARK}
        value={draft.remark}
        onChange={(event) => onDraft({ ...draft, remark: event.target.value })}
        onKeyDown={(event) => {
          if (event.key === 'Escape') event.currentTarget.blur();
        }}
      />
    </div>
  );
}

/** A choice that is on or off; the sign says so besides the colour. */
function Toggle({ on, onPress, children }: { on: boolean; onPress: () => void; children: React.ReactNode }) {
  return (
    <button
      type="button"
      aria-pressed={on}
      onClick={onPress}
      className={classNames(
        'inline-flex min-h-7 items-center gap-1.5 rounded-sm border px-2 text-xs hover:border-ink',
        on ? 'border-accent bg-sunken font-bold' : 'border-edge bg-raised',
      )}
    >
      <span aria-hidden="true" className={on ? 'text-accent' : 'text-muted'}>
        {on ? '●' : '○'}
      </span>
      {children}
    </button>
  );
}
