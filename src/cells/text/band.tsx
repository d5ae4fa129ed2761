import "../../styles/prose.css";
import type { QuotedNumber } from "../../../shared/schemas/text.ts";
import { askedInWords } from "../../../shared/tables/text-finding.ts";
import type { BandProps } from "../types.ts";
import { ReadText } from "./read-text.tsx";

/** A text within the study. */
export function TextBand({ finding }: BandProps<"text">) {
  return (
    <>
      <ReadText finding={finding} />
      <NotCurrent quotations={finding.quotations} />
    </>
  );
}

/** Below the text, every number that is not to be relied on, with the reason in full. */
export function NotCurrent({ quotations }: { quotations: readonly QuotedNumber[] }) {
  const told = quotations.filter(({ standing }) => standing !== "current");
  if (told.length === 0) return null;
  return (
    <ul className="type-small mt-4 grid max-w-[44rem] gap-1.5 text-ink2" aria-label="Numbers that are not current">
      {told.map((one) => (
        <li key={one.from}>{notCurrentInWords(one)}</li>
      ))}
    </ul>
  );
}

function notCurrentInWords(one: QuotedNumber): string {
  if (one.standing === "out of date") return `${one.printed} is out of date: ${one.cell} was ${one.because}.`;
  return `${askedInWords(one)}: ${one.because}`;
}
