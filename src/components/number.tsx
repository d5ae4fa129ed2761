import { Fragment } from "react";

const RAISED = /([⁻⁰¹²³⁴⁵⁶⁷⁸⁹]+)/;
const SUPERSCRIPTS = "⁰¹²³⁴⁵⁶⁷⁸⁹";

function lowered(raised: string): string {
  return [...raised].map((sign) => (sign === "⁻" ? "\u2212" : SUPERSCRIPTS.indexOf(sign))).join("");
}

/** A printed number or sentence with its raised exponents set as such: 3 × 10⁻¹⁶ whatever the face has glyphs for. */
export function Printed({ text }: { text: string }) {
  return text.split(RAISED).map((part, index) =>
    // split() with one group alternates text and exponents.
    index % 2 === 1 ? (
      <sup key={index} className="text-[0.72em] leading-none">
        {lowered(part)}
      </sup>
    ) : (
      <Fragment key={index}>{part}</Fragment>
    ),
  );
}

/** A standard error in parentheses; the closing one hangs into the gutter so that digits stand under digits. */
export function ErrorBelow({ error }: { error: string }) {
  return (
    <span className="block text-[0.78125rem]/[0.9375rem] text-ink2">
      (<Printed text={error} />
      <span className="mr-[-0.33em]">)</span>
    </span>
  );
}

interface EstimateProps {
  readonly value: string;
  readonly error: string;
  /** Stands in the place of the error: "−0.014 to 0.002". */
  readonly interval?: string | undefined;
}

/** An estimate over its standard error, or over its interval, right-aligned. */
export function Estimate({ value, error, interval }: EstimateProps) {
  return (
    <span className="inline-block text-right tabular-nums">
      <span className="block">
        <Printed text={value} />
      </span>
      {interval === undefined ? (
        <ErrorBelow error={error} />
      ) : (
        <span className="block whitespace-nowrap text-[0.78125rem]/[0.9375rem] text-ink2">{interval}</span>
      )}
    </span>
  );
}
