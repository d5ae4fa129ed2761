import type { QuotedNumber } from "../../../shared/schemas/text.ts";
import { askedInWords } from "../../../shared/tables/text-finding.ts";
import { StateShape } from "../../components/state-shape.tsx";
import { useWhereCellsAre } from "./where-cells-are.ts";

/** A quoted number where it stands: a link to its cell; marked by shape, wash and words where it is not current. */
export function Quotation({ quotation }: { quotation: QuotedNumber }) {
  const { standing, printed, says, because, cell } = quotation;
  const address = useWhereCellsAre()(cell);
  if (standing === "absent") {
    return (
      <span className="quoted quoted-absent" title={because}>
        <StateShape state="failed" /> no number for {askedInWords(quotation)}
      </span>
    );
  }
  const isStale = standing === "out of date";
  const title = isStale ? `${says}, from ${cell}, out of date: ${because}` : `${says}, from ${cell}`;
  const className = isStale ? "quoted quoted-stale" : "quoted";
  const shown = (
    <>
      {isStale && (
        <>
          <StateShape state="out of date" />{" "}
        </>
      )}
      {printed}
      {isStale && <span className="sr-only">, out of date</span>}
    </>
  );
  return address === undefined ? (
    <span className={className} title={title}>
      {shown}
    </span>
  ) : (
    <a className={className} href={address} title={title}>
      {shown}
    </a>
  );
}
