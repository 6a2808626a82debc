import type { CatalogueDetail } from '../../../shared/schemas/catalogue';

/** The columns of the file and what the mapping makes of each. */
export function ColumnList({ columns }: { columns: CatalogueDetail['columns'] }) {
  return (
    <div className="relative overflow-x-auto" tabIndex={0} role="region" aria-label="Columns of the file">
      <table className="w-full border-collapse text-sm">
        <thead>
          <tr className="border-b border-edge text-left text-xs text-muted">
            <th className="w-12 py-2 pr-4 text-right font-medium">No.</th>
            <th className="py-2 pr-4 font-medium">Column</th>
            <th className="py-2 pr-4 font-medium">Holds</th>
            <th className="py-2 font-medium">Understood as</th>
          </tr>
        </thead>
        <tbody>
          {columns.map((column) => (
            <tr key={column.index} className="border-b border-rule">
              <td className="py-1.5 pr-4 text-right text-muted">{column.index + 1}</td>
              <td className="py-1.5 pr-4">{column.name}</td>
              <td className="py-1.5 pr-4 text-muted">{column.kind}</td>
              <td className="py-1.5">
                {column.role === 'kept as written' ? <span className="text-muted">{column.role}</span> : column.role}
              </td>
            </tr>
          ))}
        </tbody>
      </table>
    </div>
  );
}
