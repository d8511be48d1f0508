/** Blocks in the shape that is coming. `rows` of a picture and two lines each. */
export function Skeleton({ rows = 3, label = 'Loading' }: { rows?: number; label?: string }) {
  return (
    <div role="status">
      <span className="sr-only">{label}</span>
      <div aria-hidden="true">
        {Array.from({ length: rows }, (_, row) => (
          // biome-ignore lint/suspicious/noArrayIndexKey: the rows are all alike
          <div key={row} className="flex gap-3 border-b border-rule px-(--margin) py-4">
            <div className="skeleton h-16 w-1/5 min-w-24" />
            <div className="grid grow content-center gap-2">
              <div className="skeleton h-4 w-1/2" />
              <div className="skeleton h-3 w-1/3" />
            </div>
          </div>
        ))}
      </div>
    </div>
  );
}
