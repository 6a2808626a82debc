import type { ReactNode } from 'react';
import { CopyButton } from '../components/copy-button';
import { tsvCell } from '../components/table-tsv';

/** The table behind a chart: for screen readers, for reading numbers off, and for copying. */
export function ChartTable({
  label,
  head,
  rows,
  action,
}: {
  label: string;
  head: readonly string[];
  rows: readonly (readonly (string | number)[])[];
  /** A last cell per row, e.g. a button that chooses it. */
  action?: (index: number) => ReactNode;
}) {
  const tsv = () =>
    `${[head, ...rows].map((row) => row.map((cell) => tsvCell(String(cell))).join('\t')).join('\n')}\n`;
  return (
    <details className="screen-only text-xs">
      <summary className="w-fit text-muted hover:text-ink">Table behind the chart</summary>
      <div className="mt-2 grid justify-items-start gap-2">
        <CopyButton text={tsv} label="Copy the table" />
        <div
          role="region"
          aria-label={`${label}, table`}
          tabIndex={0}
          className="max-h-72 w-full overflow-auto border border-rule bg-raised"
        >
          <table className="w-full border-collapse">
            <caption className="sr-only">{label}</caption>
            <thead>
              <tr>
                {head.map((name) => (
                  <th key={name} scope="col" className="border-b border-edge px-2 py-1 text-left font-bold">
                    {name}
                  </th>
                ))}
                {action !== undefined && (
                  <th scope="col" className="border-b border-edge px-2 py-1">
                    <span className="sr-only">Choose</span>
                  </th>
                )}
              </tr>
            </thead>
            <tbody>
              {rows.map((row, index) => (
                <tr key={index} className="border-b border-rule">
                  {row.map((cell, at) => (
                    <td key={at} className="px-2 py-1 whitespace-nowrap">
                      {cell}
                    </td>
                  ))}
                  {action !== undefined && <td className="px-2 py-1">{action(index)}</td>}
                </tr>
              ))}
            </tbody>
          </table>
        </div>
      </div>
    </details>
  );
}
