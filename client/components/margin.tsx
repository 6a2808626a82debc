import type { ReactNode } from 'react';
import { classNames } from './class-names';
import { storedChoice } from './stored-choice';
import { useStoredChoice } from './use-stored-choice';

const marginChoice = storedChoice('margin', ['open', 'closed'], 'open');

/**
 * The margin column: provenance, history, and what the numbers mean. Beside the content on wide screens, where it
 * can be folded away; below the content on narrow ones.
 */
export function Margin({ children }: { children: ReactNode }) {
  const [choice, setChoice] = useStoredChoice(marginChoice);
  const open = choice === 'open';
  return (
    <aside
      aria-label="Margin"
      className={classNames(
        'border-t border-rule pt-4 margin:border-t-0 margin:border-l margin:pt-0',
        open ? 'margin:w-72 margin:pl-6' : 'margin:w-8 margin:pl-2',
      )}
    >
      <div className="screen-only mb-3 hidden justify-end margin:flex">
        <button
          type="button"
          aria-expanded={open}
          onClick={() => setChoice(open ? 'closed' : 'open')}
          className="rounded-sm border border-transparent px-1.5 text-xs text-muted hover:border-edge hover:text-ink"
        >
          <span className={open ? '' : 'sr-only'}>{open ? 'Fold the margin' : 'Open the margin'} </span>
          <span aria-hidden="true">{open ? '»' : '«'}</span>
        </button>
      </div>
      <div className={classNames('grid gap-6 sm:grid-cols-2 margin:grid-cols-1', !open && 'margin:hidden')}>
        {children}
      </div>
    </aside>
  );
}

/** One note in the margin: a small head and reading text. */
export function MarginNote({ title, children }: { title: string; children: ReactNode }) {
  return (
    <section className="grid min-w-0 content-start gap-1.5">
      <h2 className="text-xs font-bold text-muted">{title}</h2>
      <div className="prose-serif">{children}</div>
    </section>
  );
}
