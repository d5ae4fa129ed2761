import { TOTAL_EXPENDITURE } from "../../../shared/schemas/elasticities.ts";
import type { Value } from "../../../shared/study/edit.ts";
import type { KeyPath, Written } from "../form/written.ts";

const OF = ["point", "groups", "rows"] as const;

/** Of whom a source asks: one point, groups of rows, or all rows together. */
export type Of = (typeof OF)[number];

export const isOf = (word: string): word is Of => (OF as readonly string[]).includes(word);

export function questionOf(written: Pick<Written, "value" | "text">): Of {
  if (written.value("groups") !== undefined) return "groups";
  return written.text("over") === "rows" && written.value("at") === undefined ? "rows" : "point";
}

/** The edits that turn a source to another question: keys of the others go. */
export function newQuestion(of: Of): (readonly [KeyPath, Value | undefined])[] {
  const [at, groups, over] = [["at"], ["groups"], ["over"]];
  if (of === "point") {
    return [
      [groups, undefined],
      [over, undefined],
      [at, "mean"],
    ];
  }
  if (of === "rows") {
    return [
      [at, undefined],
      [groups, undefined],
      [over, "rows"],
    ];
  }
  return [
    [at, undefined],
    [over, undefined],
    [groups, { of: TOTAL_EXPENDITURE, quantiles: 5 }],
  ];
}
