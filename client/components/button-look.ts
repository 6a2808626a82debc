import { classNames } from './class-names';

export type ButtonKind = 'plain' | 'main' | 'bad' | 'quiet';
export type ButtonSize = 'sm' | 'md';

const KINDS: Record<ButtonKind, string> = {
  plain: 'border-edge bg-raised text-ink enabled:hover:border-ink',
  main: 'border-accent bg-accent font-medium text-on-accent enabled:hover:border-ink',
  bad: 'border-bad bg-raised font-medium text-bad enabled:hover:border-ink',
  quiet: 'border-transparent bg-transparent text-ink enabled:hover:border-edge',
};

const SIZES: Record<ButtonSize, string> = {
  sm: 'min-h-7 px-2 text-xs',
  md: 'min-h-9 px-3 text-sm',
};

/** Classes that buttons, links and summaries that look like buttons share. */
export function buttonLook(kind: ButtonKind = 'plain', size: ButtonSize = 'md'): string {
  return classNames(
    'inline-flex items-center justify-center gap-2 rounded-sm border py-1 text-center leading-tight no-underline',
    'transition-colors disabled:cursor-not-allowed disabled:border-dashed disabled:text-muted disabled:bg-transparent',
    KINDS[kind],
    SIZES[size],
  );
}
