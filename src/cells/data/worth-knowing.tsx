import type { DataFinding } from "../../../shared/schemas/data.ts";
import { capital } from "../../../shared/study/words.ts";
import { printCount } from "../../../shared/tables/numbers.ts";
import { TableScroller } from "../../components/table-scroller.tsx";
import type { FormProps } from "../types.ts";

type Flag = DataFinding["flags"][number];
type OnLook = FormProps["onLook"];

const rowsWord = (count: number) => `${printCount(count)} ${count === 1 ? "row" : "rows"}`;

function Note({ flag, onLook }: { flag: Flag; onLook: OnLook }) {
  const parts = onLook ? (flag.parts ?? []) : [];
  return (
    <div className="max-w-[26rem] break-inside-avoid pb-3">
      <h3 className="text-[0.90625rem]/[1.3125rem] font-semibold">{capital(flag.about)}</h3>
      <p className="text-[0.875rem]/[1.25rem] text-ink2">{capital(flag.sentence)}</p>
      {onLook && parts.length > 0 && (
        <ul aria-label={`Look at the rows of ${flag.about}`} className="no-print flex flex-wrap gap-x-4 type-small">
          {parts.map(({ key, words, count }) => (
            <li key={key}>
              <button
                type="button"
                className="word"
                onClick={() => onLook({ about: key, title: `${capital(flag.about)}: ${words}` })}
              >
                <span className="sr-only">Look at the rows of </span>
                {words}, {rowsWord(count)}
              </button>
            </li>
          ))}
        </ul>
      )}
      {parts.length === 0 && flag.rows.length > 0 && (
        <details className="type-small">
          <summary className="word list-none">{rowsWord(flag.rows.length)}</summary>
          <TableScroller label="Rows" className="max-h-40 overflow-y-auto text-ink2">
            {flag.rows.map(printCount).join(", ")}
          </TableScroller>
        </details>
      )}
    </div>
  );
}

/** What is worth knowing before estimating; never an error, so it stands last. */
export function WorthKnowing({ flags, onLook }: { flags: readonly Flag[]; onLook?: OnLook }) {
  return (
    <section aria-labelledby="worth-knowing" className="border-line border-t pt-4">
      <h2 id="worth-knowing" className="mb-1 type-section">
        Worth knowing before estimating
      </h2>
      {flags.length === 0 ? (
        <p className="text-[0.875rem]/[1.25rem] text-ink2">
          Nothing unusual in zeros, outliers, price variation or collinearity.
        </p>
      ) : (
        <div className="gap-8 min-[800px]:columns-2">
          {flags.map((flag) => (
            <Note key={flag.about + flag.sentence} flag={flag} onLook={onLook} />
          ))}
        </div>
      )}
    </section>
  );
}
