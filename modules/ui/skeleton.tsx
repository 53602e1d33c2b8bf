const widths = ["82%", "64%", "74%", "58%", "70%"];

/** Still shapes in place of rows, so nothing jumps when they come. `label` is read out and shown under the rows. */
export function SkeletonRows({ rows = 5, label }: { rows?: number; label: string }) {
  return (
    <div>
      <div aria-hidden="true">
        {Array.from({ length: rows }, (_, i) => (
          <div className="sk-row" key={i}>
            <span className="sk" />
            <span className="sk" style={{ width: widths[i % widths.length] }} />
            <span className="sk" />
            <span className="sk" />
          </div>
        ))}
      </div>
      <p className="sm dim mt-2.5" role="status">
        {label}
      </p>
    </div>
  );
}

/** One still shape of a given size, e.g. `<Skeleton width="100%" height={240} />`. */
const Skeleton = ({ width = "100%", height = 14 }: { width?: number | string; height?: number | string }) => (
  <span className="sk" style={{ width, height }} aria-hidden="true" />
);

/** A whole page of still shapes for a route's loading file. */
export function SkeletonPage({ label, rows = 8 }: { label: string; rows?: number }) {
  return (
    <main id="main" className="page">
      <div className="head" aria-hidden="true">
        <Skeleton width={220} height={28} />
      </div>
      <SkeletonRows rows={rows} label={label} />
    </main>
  );
}
