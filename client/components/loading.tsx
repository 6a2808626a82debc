/** A place that is still loading: quiet bars where lines will be, and a word for screen readers. */
export function Loading({ label = 'Loading', rows = 3 }: { label?: string; rows?: number }) {
  return (
    <div role="status" className="grid gap-3 py-2">
      <span className="sr-only">{label}…</span>
      {Array.from({ length: rows }, (_, row) => (
        <div
          key={row}
          aria-hidden="true"
          className="loading-pulse h-4 bg-rule"
          style={{ width: `${92 - ((row * 29) % 50)}%` }}
        />
      ))}
    </div>
  );
}
