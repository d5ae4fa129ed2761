import type { MatrixAtPoint } from "../../../shared/schemas/slutsky.ts";
import { DECIMALS, printFixed, THIN_SPACE } from "../../../shared/tables/numbers.ts";

const print = (value: number) => printFixed(value, DECIMALS.entry);

interface EigenvalueListProps extends Pick<MatrixAtPoint, "eigenvalues"> {
  /** With the direction of prices each belongs to. */
  readonly directions?: boolean;
}

/** The eigenvalues as a short list over their standard errors, the null direction last. */
export function EigenvalueList({ eigenvalues, directions = false }: EigenvalueListProps) {
  const hasIntervals = eigenvalues.some(({ interval }) => interval !== undefined);
  return (
    <table className="type-table w-full">
      <caption className="type-small pb-1 text-left text-ink2">
        Eigenvalues{hasIntervals && `, 95${THIN_SPACE}% percentile intervals`}
      </caption>
      <tbody>
        {eigenvalues.map((eigenvalue, index) => (
          <tr key={index}>
            <td className="py-0.5 text-right">{print(eigenvalue.value)}</td>
            <td className="py-0.5 pl-5 text-right text-ink2">({print(eigenvalue.standardError)})</td>
            {hasIntervals && (
              <td className="py-0.5 pl-5 text-right whitespace-nowrap text-ink2">
                {eigenvalue.interval?.map(print).join(" to ")}
              </td>
            )}
            {directions && <td className="py-0.5 pl-5 text-right text-ink2">{eigenvalue.direction}</td>}
          </tr>
        ))}
        <tr>
          <td className="py-0.5 text-right">0</td>
          <td className="py-0.5 pl-5 text-right text-ink2" colSpan={1 + (hasIntervals ? 1 : 0) + (directions ? 1 : 0)}>
            all prices
          </td>
        </tr>
      </tbody>
    </table>
  );
}
