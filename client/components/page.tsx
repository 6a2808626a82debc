import type { ReactNode } from 'react';
import { Margin } from './margin';

/** What every page is made of: title row, content, margin. */
export function Page({
  title,
  heading,
  lead,
  actions,
  margin,
  children,
}: {
  /** Plain text: the window's title, and the heading unless `heading` is given. */
  title: string;
  heading?: ReactNode;
  /** One line below the heading. */
  lead?: ReactNode;
  actions?: ReactNode;
  /** MarginNote sections. */
  margin?: ReactNode;
  children?: ReactNode;
}) {
  return (
    <div className="grid min-w-0 grid-cols-[minmax(0,1fr)] gap-6 margin:grid-cols-[minmax(0,1fr)_auto] margin:gap-8">
      <title>{`${title} · Idem`}</title>
      <div className="grid min-w-0 grid-cols-[minmax(0,1fr)] content-start gap-6">
        <header className="flex flex-wrap items-end justify-between gap-x-6 gap-y-3">
          <div className="grid min-w-0 gap-1">
            <h1 className="text-xl font-bold">{heading ?? title}</h1>
            {lead !== undefined && <div className="text-muted">{lead}</div>}
          </div>
          {actions !== undefined && <div className="screen-only flex flex-wrap gap-2">{actions}</div>}
        </header>
        {children}
      </div>
      {margin !== undefined && <Margin>{margin}</Margin>}
    </div>
  );
}
