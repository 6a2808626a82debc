import type { ReactNode } from 'react';

/** Head of a column in a small table. */
export function HeadCell({ right = false, children }: { right?: boolean; children: ReactNode }) {
  return (
    <th scope="col" className={right ? 'py-2 pr-4 text-right font-medium' : 'py-2 pr-4 font-medium'}>
      {children}
    </th>
  );
}
