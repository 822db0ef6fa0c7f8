/** Ruled lines where rows will be, from 300 ms on: nothing turns, nothing flashes. */
export function RuledLines({ rows = 5, label = 'Loading' }: { rows?: number; label?: string }) {
  return (
    <div role="status" className="appear-late">
      <span className="sr-only">{label}</span>
      {Array.from({ length: rows }, (_, row) => (
        <div key={row} aria-hidden="true" className="flex h-14 items-center gap-10 border-b border-line">
          <span className="h-px w-16 bg-line" />
          <span className="h-px w-28 bg-line" />
          <span className="h-px flex-1 bg-line" />
        </div>
      ))}
    </div>
  )
}
