import type { ReactNode } from 'react';

/** Nothing is here yet: says so plainly and what to do next. */
export function EmptyState({
  title,
  actions,
  children,
}: {
  title: string;
  actions?: ReactNode;
  children?: ReactNode;
}) {
  return (
    <div className="grid justify-items-start gap-3 border border-dashed border-edge p-5 sm:p-8">
      <p className="text-base font-bold">{title}</p>
      {children !== undefined && <div className="prose-serif max-w-prose">{children}</div>}
      {actions !== undefined && <div className="flex flex-wrap gap-2">{actions}</div>}
    </div>
  );
}
