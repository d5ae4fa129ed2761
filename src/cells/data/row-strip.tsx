/** Where in the file the rows left out stand: a tick in each slice that has some, darker where it has more. */
export function RowStrip({ strip, rowsPerSlice }: { strip: readonly number[]; rowsPerSlice: number }) {
  return (
    <svg
      aria-hidden="true"
      viewBox={`0 0 ${strip.length * 4} 14`}
      preserveAspectRatio="none"
      className="block h-3.5 w-full min-w-24"
    >
      <path d={`M0 13.5H${strip.length * 4}`} stroke="var(--ctl)" vectorEffect="non-scaling-stroke" />
      {strip.map((count, slice) => {
        if (count === 0) return null;
        const filled = Math.min(1, count / Math.max(1, rowsPerSlice));
        const width = 1 + 3 * filled;
        return <rect key={slice} x={slice * 4} y="1" width={width} height="12" fill="var(--ink)" />;
      })}
    </svg>
  );
}
