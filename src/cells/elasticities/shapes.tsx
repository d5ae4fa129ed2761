import type { ClassOfGood, ElasticityGroup } from "../../../shared/schemas/elasticities.ts";
import { CLASS_WORDS } from "../../../shared/tables/elasticities.ts";

const PATHS: Readonly<Record<ClassOfGood["kind"], { d: string; filled: boolean }>> = {
  luxury: { d: "M5.5 1.2L10 9.6H1Z", filled: true },
  necessity: { d: "M1.8 1.8H9.2V9.2H1.8Z", filled: true },
  inferior: { d: "M5.5 9.8L10 1.4H1Z", filled: true },
  undecided: { d: "M5.5 1L10 5.5L5.5 10L1 5.5Z", filled: false },
};

/** A class as a shape and its word: up for a luxury, a square for a necessity, down for an inferior good, open while undecided. */
export function ClassWord({ kind }: { kind: ClassOfGood["kind"] }) {
  const { d, filled } = PATHS[kind];
  return (
    <span className={`inline-flex items-center gap-1.5 whitespace-nowrap ${filled ? "" : "text-ink2"}`}>
      <svg aria-hidden="true" viewBox="0 0 11 11" width="11" height="11" className="shrink-0" data-shape={kind}>
        <path d={d} fill={filled ? "currentColor" : "none"} stroke="currentColor" strokeWidth="1.2" />
      </svg>
      {CLASS_WORDS[kind]}
    </span>
  );
}

/** The mark of a sign: up for substitutes, down for complements. */
export function SignMark({ pair }: { pair: "substitutes" | "complements" }) {
  return (
    <svg aria-hidden="true" viewBox="0 0 9 9" width="8" height="8" className="mr-1 inline-block shrink-0">
      <path
        d={pair === "substitutes" ? "M4.5 1L8.4 8H0.6Z" : "M4.5 8L8.4 1H0.6Z"}
        fill={pair === "substitutes" ? "var(--p4)" : "var(--n4)"}
      />
    </svg>
  );
}

/** The sign of a cross elasticity where it is beyond doubt; nothing otherwise. */
export function PairMark({ pair }: { pair: ElasticityGroup["net"][number][number] }) {
  if (pair === null || pair === "undecided") return null;
  return (
    <>
      <SignMark pair={pair} />
      <span className="sr-only">{pair} </span>
    </>
  );
}
