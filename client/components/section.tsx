import type { ReactNode } from 'react';

/** A part of a page under a second-level heading and a fine rule. */
export function Section({
  title,
  actions,
  id,
  children,
}: {
  title: ReactNode;
  actions?: ReactNode;
  id?: string;
  children: ReactNode;
}) {
  return (
    <section id={id} className="grid min-w-0 grid-cols-[minmax(0,1fr)] gap-3">
      <div className="flex flex-wrap items-end justify-between gap-x-4 gap-y-2 border-b border-rule pb-1">
        <h2 className="text-base font-bold">{title}</h2>
        {actions !== undefined && <div className="screen-only flex flex-wrap gap-2">{actions}</div>}
      </div>
      {children}
    </section>
  );
}
