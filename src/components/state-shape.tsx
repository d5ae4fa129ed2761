/** Where a thing that is worked out stands. */
export type ShownState = "draft" | "estimating" | "current" | "out of date" | "failed";

export const STATE_COLOURS: Readonly<Record<ShownState, string>> = {
  draft: "var(--ink2)",
  estimating: "var(--accent)",
  current: "var(--ink)",
  "out of date": "var(--stale)",
  failed: "var(--fail)",
};

/** An open ring over a faint one; the gap is what turns. */
function Turning() {
  return (
    <>
      <circle cx="5.5" cy="5.5" r="4.4" stroke="var(--rule2)" strokeWidth="1.8" />
      <g className="turns">
        <circle cx="5.5" cy="5.5" r="4.4" stroke="none" />
        <path d="M9.3 3.3A4.4 4.4 0 1 1 5.5 1.1" strokeWidth="1.8" />
      </g>
    </>
  );
}

const FIGURES: Readonly<Record<ShownState, React.ReactNode>> = {
  draft: <circle cx="5.5" cy="5.5" r="4.4" strokeWidth="1.4" strokeDasharray="1.4 1.36" />,
  estimating: <Turning />,
  current: <circle cx="5.5" cy="5.5" r="4.9" fill="currentColor" stroke="none" />,
  "out of date": (
    <>
      <circle cx="5.5" cy="5.5" r="4.6" strokeWidth="1.4" />
      <path d="M5.5 1.2A4.3 4.3 0 0 0 5.5 9.8Z" fill="currentColor" stroke="none" />
    </>
  ),
  failed: <path d="M1.2 1.2H9.8V9.8H1.2ZM1.2 9.8L9.8 1.2" strokeWidth="1.4" />,
};

/** The shape's strokes alone, for a drawing that places it (11 × 11). */
export function StateFigure({ state }: { state: ShownState }) {
  return (
    <g fill="none" stroke="currentColor" style={{ color: STATE_COLOURS[state] }}>
      {FIGURES[state]}
    </g>
  );
}

/** Always beside the word that says the same; hidden from those who hear the page. */
export function StateShape({ state }: { state: ShownState }) {
  return (
    <svg
      aria-hidden="true"
      viewBox="0 0 11 11"
      width="11"
      height="11"
      className="shrink-0 translate-y-[0.5px] overflow-visible"
      data-state={state}
    >
      <StateFigure state={state} />
    </svg>
  );
}

/** Shape and words: "4 current". */
export function StateWords({ state, words }: { state: ShownState; words: string }) {
  return (
    <span className="inline-flex items-baseline gap-2 font-semibold" style={{ color: STATE_COLOURS[state] }}>
      <StateShape state={state} />
      {words}
    </span>
  );
}
