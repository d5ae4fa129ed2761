/** Left is a disc, right a square: the marks two systems have wherever they are drawn or listed together. */
export function SideMark({ side }: { side: "left" | "right" }) {
  return (
    <svg aria-hidden="true" viewBox="0 0 11 11" width="11" height="11" className="mr-1.5 inline-block shrink-0">
      {side === "left" ? (
        <circle cx="5.5" cy="5.5" r="4" fill="var(--s1)" />
      ) : (
        <rect x="2" y="2" width="7" height="7" fill="var(--recto)" stroke="var(--s2)" strokeWidth="1.8" />
      )}
    </svg>
  );
}
