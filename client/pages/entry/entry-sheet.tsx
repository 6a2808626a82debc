import type { ReactNode } from 'react';

/** The frame of the pages before the application proper: a form, and beside it what it is for. */
export function EntrySheet({
  title,
  children,
  beside,
}: {
  title: string;
  children: ReactNode;
  beside: ReactNode;
}) {
  return (
    <div className="mx-auto grid min-h-dvh max-w-4xl content-start gap-8 px-4 py-8 sm:px-8 sm:py-16">
      <title>{`${title} · Idem`}</title>
      <header className="grid gap-1 border-b border-rule pb-4">
        <p className="text-2xl font-bold">Idem</p>
        <p className="text-muted">One sky, one record per object.</p>
      </header>
      <main className="grid gap-8 wide:grid-cols-[minmax(0,1fr)_18rem] wide:gap-12">
        <div className="grid min-w-0 content-start gap-5">
          <h1 className="text-lg font-bold">{title}</h1>
          {children}
        </div>
        <aside
          aria-label="About this page"
          className="prose-serif border-t border-rule pt-4 wide:border-t-0 wide:border-l wide:pt-0 wide:pl-6"
        >
          {beside}
        </aside>
      </main>
    </div>
  );
}
