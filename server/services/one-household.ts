import type { CellKind, FindingOf } from "../../shared/schemas/cell.ts";
import type { pointSpecification } from "../../shared/schemas/slutsky.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";
import { parseCell } from "../../shared/study/parse-cell.ts";
import { conflict } from "../errors.ts";

/** Quantiles nearer the ends than this are the total of the poorest or the richest household asked. */
const OUTERMOST_QUANTILE = 0.01;

/**
 * Groups of fewer households are not sealed. From practice: many statistics offices ask for ten or more behind a
 * published figure; what the data's owner asks comes first.
 */
const SMALLEST_GROUP = 10;

const STANDS_AT_A_POINT = ["slutsky", "elasticities", "price change", "figure"] as const;

/** What stands at a row of the upload, or for a handful of them, would show a referee those households. */
export function refuseOneHousehold({ cell, finding }: { cell: CellSource; finding: FindingOf<CellKind> }): void {
  const { name, source } = cell;
  if (finding.kind === "elasticities") refuseSmallGroups(name, finding);
  if (finding.kind === "price change" && finding.incidence) refuseSmallGroups(name, finding.incidence);
  if (finding.kind === "figure") refuseSmallGroups(name, drawnGroups(finding));
  if (!STANDS_AT_A_POINT.some((kind) => kind === finding.kind)) return;
  const { specification } = parseCell(finding.kind, source);
  if (specification?.kind !== finding.kind) throw conflict(`${name} is changing; seal it again.`);
  if (!("at" in specification) || specification.at === undefined) return;
  const pointName =
    finding.kind === "elasticities" ? finding.groups[0].name : "pointName" in finding && finding.pointName;
  refuseOnePoint(name, pointName || "a point of its own", specification.at);
}

/** The groups a figure is drawn of, or its bins of rows. */
function drawnGroups({ drawn }: FindingOf<"figure">): Grouped {
  const without = "without" in drawn ? drawn.without : [];
  if ("groups" in drawn) return { groups: drawn.groups, without };
  if (drawn.show !== "fit of shares") return { groups: [], without };
  const bins = drawn.goods.flatMap(({ good, bins }) => bins.map(({ rows }) => ({ name: `a bin of ${good}`, rows })));
  return { groups: bins, without };
}

function refuseOnePoint(name: string, pointName: string, at: typeof pointSpecification._output): void {
  if (typeof at === "string" || "prices" in at) return;
  if ("row" in at) {
    throw conflict(
      `${name} stands at ${pointName}, the prices and total of one household: seal it at the base point or the mean.`,
    );
  }
  const fraction = Number(at.x.slice("quantile ".length));
  if (fraction >= OUTERMOST_QUANTILE && fraction <= 1 - OUTERMOST_QUANTILE) return;
  throw conflict(
    `${name} stands at ${pointName}, the total of one household: seal it at a quantile from ${OUTERMOST_QUANTILE} to ${1 - OUTERMOST_QUANTILE}.`,
  );
}

interface Grouped {
  readonly groups: readonly Group[];
  readonly without: readonly Group[];
}

interface Group {
  readonly name: string;
  readonly rows?: number;
}

function refuseSmallGroups(name: string, { groups, without }: Grouped): void {
  const small = [...groups, ...without].find(({ rows }) => rows !== undefined && rows < SMALLEST_GROUP);
  if (small === undefined) return;
  throw conflict(
    `${name} has a group of ${small.rows} ${small.rows === 1 ? "row" : "rows"} (${small.name}), and groups of fewer than ${SMALLEST_GROUP} are not sealed: they may show whose they are.`,
  );
}
