import type { ReactNode } from "react";

export interface AccountLine {
  readonly key: string;
  readonly label: ReactNode;
  readonly number: string;
  /** What stands between: where in the file, which rows. */
  readonly between?: ReactNode;
}

interface AccountProps {
  readonly caption: string;
  readonly first: AccountLine;
  /** What is taken off, each with a minus. */
  readonly lines: readonly AccountLine[];
  readonly total: AccountLine;
}

function Row({ line, strong = false, total = false }: { line: AccountLine; strong?: boolean; total?: boolean }) {
  const weight = strong ? "font-semibold" : "font-normal";
  const edge = total ? "border-line border-t" : "";
  return (
    <tr className={edge}>
      <th scope="row" className={`py-1 pr-3 text-left min-[1024px]:whitespace-nowrap ${weight}`}>
        {line.label}
      </th>
      <td className="py-1">{line.between}</td>
      <td className={`py-1 pl-3 text-right ${weight}`}>{line.number}</td>
    </tr>
  );
}

/** An account: what there was, what is taken off, and what is left under a single rule and over a double one. */
export function AccountTable({ caption, first, lines, total }: AccountProps) {
  return (
    <table className="relative w-full border-line border-b-[3px] border-double text-[0.875rem]/[1.25rem] tabular-nums">
      <caption className="sr-only">{caption}</caption>
      <tbody>
        <Row line={first} strong={first.between !== undefined} />
        {lines.map((line) => (
          <Row key={line.key} line={line} />
        ))}
        <Row line={total} strong total />
      </tbody>
    </table>
  );
}
