/** The five figures of a law: a line and a curve that touch, are clamped, touch here, cross, or are not set out. */
export type VerdictShape = "holds" | "imposed" | "holds here" | "breaks" | "not stated";

const CURVE = "M4.5 1.5C4.5 9.5 7 12.9 11 12.9C15 12.9 17.5 9.5 17.5 1.5";
const LINE = "M1 13.6H21";

function touching(shape: VerdictShape) {
  return (
    <>
      <path d={LINE} />
      <path d={CURVE} />
      {shape === "imposed" && <path d="M1 10.8V16M21 10.8V16" />}
      <circle cx="11" cy="13" r="2.7" fill={shape === "holds here" ? "var(--recto)" : "currentColor"} />
    </>
  );
}

function crossing() {
  const cross = (x: number) => `M${x - 2} 6L${x + 2} 10M${x - 2} 10L${x + 2} 6`;
  return (
    <>
      <path d="M1 8H21" />
      <path d="M4 1C4.3 10.5 7 14.6 11 14.6C15 14.6 17.7 10.5 18 1" />
      <path d={`${cross(5.2)}${cross(16.8)}`} />
    </>
  );
}

function apart() {
  return (
    <g strokeDasharray="1.6 2.2">
      <path d="M1 15H21" />
      <path d="M4.5 0.8C4.5 7.6 7 10.4 11 10.4C15 10.4 17.5 7.6 17.5 0.8" />
    </g>
  );
}

/** Always beside its word, which says the same; so it is hidden from those who hear the page. */
export function VerdictFigure({ shape }: { shape: VerdictShape }) {
  return (
    <svg
      aria-hidden="true"
      viewBox="0 0 22 16"
      width="22"
      height="16"
      fill="none"
      stroke="currentColor"
      strokeWidth="1.5"
      className="shrink-0 overflow-visible"
      data-shape={shape}
    >
      {shape === "breaks" ? crossing() : shape === "not stated" ? apart() : touching(shape)}
    </svg>
  );
}
