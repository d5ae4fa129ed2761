import { printCount } from "../../shared/tables/numbers.ts";
import { type ComparedFinding, ENOUGH } from "../bundle/compare-findings.ts";
import type { ReplicatedCell, ReplicatedData, Replication } from "./replication.ts";

/** Whether every cell could be compared with the very data and agrees. */
export function isReplicated({ data, cells, complaints }: Replication): boolean {
  const isSame = data.every(({ sha256, expected }) => sha256 !== undefined && (expected ?? sha256) === sha256);
  return isSame && complaints.length === 0 && cells.every(isSound);
}

const isSound = ({ from, compared }: ReplicatedCell) =>
  from !== undefined && (compared === undefined || (compared.apartCount === 0 && compared.unlikeCount === 0));

/** A replication as lines of text: a head, the data, a line or more for each cell, and what comes of it. */
export function replicationInWords(replication: Replication, program: string): string {
  const { bundle, data, cells, complaints } = replication;
  const width = Math.max(...cells.map(({ name }) => name.length), 0);
  return `${[
    `${bundle.study}: made ${bundle.madeAt.slice(0, 10)} by ${bundle.program}, replicated by ${program}`,
    "",
    ...data.map(dataInWords),
    "",
    ...complaints.map(({ key, sentence }) => `refused: ${key === "" ? "" : `${key}: `}${sentence}`),
    ...cells.flatMap((cell) => cellInWords(cell, width)),
    ...bundle.leftOut.map(({ name, because }) => `${name.padEnd(width)}  not in the bundle. ${because}`),
    "",
    outcomeInWords(replication),
  ]
    .join("\n")
    .replaceAll(/(?!\n)\p{Cc}/gu, "\uFFFD")}\n`;
}

function dataInWords({ file, standing, sha256, expected }: ReplicatedData): string {
  if (sha256 === undefined)
    return `${file}: not in the bundle and not given${expected ? ` (SHA-256 ${expected})` : ""}`;
  if (expected === undefined)
    return `${file}: ${standing} (SHA-256 ${sha256}); the bundle knows the prepared data's fingerprint, compared below`;
  if (sha256 === expected) return `${file}: the very file, ${standing} (SHA-256 ${expected})`;
  return `${file}: ANOTHER FILE, ${standing}: its SHA-256 is ${sha256}, and the findings were made from ${expected}`;
}

function cellInWords({ name, kind, from, because, compared }: ReplicatedCell, width: number): string[] {
  const head = `${name.padEnd(width)}  ${kind}`;
  if (from === undefined) return [`${head}: not checked. ${because ?? ""}`.trimEnd()];
  const what = [because, compared && comparedInWords(compared)].filter((part) => part !== undefined).join(" ");
  const basis = from === "data" ? "" : ` (from ${from})`;
  const margin = " ".repeat(width + 2);
  return [
    `${head}${basis}: ${what}`,
    ...(compared?.apart ?? []).map(
      ({ at, bundled, found, digits }) =>
        `${margin}${at}: ${bundled} in the bundle, ${found} now; ${digits.toFixed(1)} digits`,
    ),
    ...(compared?.unlike ?? []).map((line) => `${margin}${line}`),
  ];
}

function comparedInWords({ numbers, same, worst, apartCount, unlikeCount }: ComparedFinding): string {
  const all = `${printCount(numbers)} numbers`;
  const words = unlikeCount > 0 ? ` ${printCount(unlikeCount)} other entries differ.` : "";
  if (worst === undefined) return `${all}, all the same to the last bit.${words}`;
  const rest = `${all}, ${printCount(same)} the same to the last bit`;
  if (apartCount > 0) return `${rest}; ${printCount(apartCount)} DIFFER within ${ENOUGH} digits.${words}`;
  const digits = Number.isFinite(worst.digits) ? `to ${worst.digits.toFixed(1)} digits or more` : "to rounding (1e-12)";
  return `${rest}, the others ${digits}.${words}`;
}

function outcomeInWords(replication: Replication): string {
  if (isReplicated(replication)) return "Everything agrees.";
  const { cells } = replication;
  const unchecked = cells.filter(({ from }) => from === undefined).length;
  const apart = cells.filter((cell) => cell.from !== undefined && !isSound(cell)).length;
  const parts = [
    apart > 0 && `${apart} of ${cells.length} cells ${apart === 1 ? "differs" : "differ"}`,
    unchecked > 0 && `${unchecked} could not be checked`,
  ].filter((part) => part !== false);
  if (parts.length > 0) return `${parts.join(", ")}; the rest agrees.`;
  return "What was compared agrees, and not from the very files the findings were made from.";
}
