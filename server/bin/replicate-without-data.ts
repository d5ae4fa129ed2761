import { matrixAt } from "../../shared/economics/slutsky.ts";
import type { BundledCell } from "../../shared/schemas/replication-bundle.ts";
import { slutskyFinding } from "../../shared/schemas/slutsky.ts";
import { type SystemSpecification, systemFinding } from "../../shared/schemas/system.ts";
import { resolveParsed } from "../../shared/study/resolve.ts";
import { parseStudyFile } from "../../shared/study/study-file.ts";
import { compareFindings } from "../bundle/compare-findings.ts";
import type { ReadBundle } from "../bundle/read-bundle.ts";
import { refitFromMoments, storedMoments } from "../engine/cells/stored-moments.ts";
import { Refusal } from "../engine/refusal.ts";
import type { RunControl } from "../engine/run.ts";
import type { ReplicatedCell } from "./replication.ts";

const NO_DATA = "Its data are not here.";
/** Bundled without the rows where a law breaks. */
const bundledMatrix = slutskyFinding.partial({ brokenRows: true });

/** What can be checked of a cell without the data it rests on: coefficients from moments, a matrix from coefficients. */
export async function replicateWithoutData(
  bundle: ReadBundle,
  cell: BundledCell,
  study: string,
  control: RunControl,
): Promise<ReplicatedCell> {
  const { name, kind, finding } = cell;
  if (finding === undefined) return { name, kind, because: NO_DATA };
  if (kind === "slutsky") return matrixAgain(cell, await bundle.json(finding));
  if (kind !== "system") return { name, kind, because: NO_DATA };
  if (cell.moments === undefined) return { name, kind, because: `${NO_DATA} No moments lie in the bundle.` };
  if ("absent" in cell.moments) return { name, kind, because: `${NO_DATA} ${cell.moments.absent}` };
  const specification = specificationOf(study, name);
  if (specification === undefined) return { name, kind, because: "The program refuses its specification now." };
  const bundled = systemFinding.parse(await bundle.json(finding));
  const moments = storedMoments.parse(await bundle.json(cell.moments.file));
  try {
    const { theta, covariance } = refitFromMoments(specification, bundled, moments, control);
    const own = bundled.fitted.theta.length;
    const again = {
      theta: theta.slice(0, own),
      ...(covariance && { covariance: covariance.slice(0, own).map((row) => row.slice(0, own)) }),
    };
    const asBundled = { theta: bundled.fitted.theta, ...(covariance && { covariance: bundled.fitted.covariance }) };
    const because = covariance
      ? "Coefficients and their covariance only."
      : "Coefficients only: their covariance needs the rows.";
    return { name, kind, from: "moments", because, compared: compareFindings(asBundled, again) };
  } catch (error) {
    if (error instanceof Refusal || error instanceof RangeError) return { name, kind, because: error.message };
    throw error;
  }
}

function matrixAgain({ name, kind }: BundledCell, bundled: unknown): ReplicatedCell {
  const { fitted, point, priceScale, totalScale, pointName, at } = bundledMatrix.parse(bundled);
  // Intervals are a bootstrap's, and neither its draws nor the rows are in the bundle.
  const { intervals: _, ...plain } = at;
  const { sample: __, negativity, ...rest } = plain.checks;
  const { interval: ___, ...largest } = negativity;
  const checks = { ...rest, negativity: largest };
  const bare = { ...plain, checks, eigenvalues: plain.eigenvalues.map(({ interval: _, ...rest }) => rest) };
  const again: unknown = JSON.parse(JSON.stringify(matrixAt(fitted, point, { priceScale, totalScale, pointName })));
  return {
    name,
    kind,
    from: "coefficients",
    because: "The matrix at its point only.",
    compared: compareFindings(JSON.parse(JSON.stringify(bare)), again),
  };
}

function specificationOf(study: string, name: string): SystemSpecification | undefined {
  const cell = resolveParsed(parseStudyFile(study).cells, []).find((one) => one.name === name);
  // Without the data its columns cannot be looked up: what the cell itself says is sound, or it would not have been bundled.
  return cell?.specification?.kind === "system" ? cell.specification : undefined;
}
