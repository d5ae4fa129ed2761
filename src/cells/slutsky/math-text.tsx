import { Fragment } from "react";

const LETTER = /((?:\p{L}|Σ)_[a-z]+|\p{L}+)/u;

/** Letters of mathematics in italic with their indices below: "γ_ij" as γ with ij, "ln" upright. */
export function MathText({ text }: { text: string }) {
  return text.split(LETTER).map((part, index) => {
    // split() with one group alternates what stands between and the letters.
    if (index % 2 === 0 || part === "ln") return <Fragment key={index}>{part}</Fragment>;
    const [letter, below] = part.split("_");
    const upright = letter === "Σ";
    return (
      <Fragment key={index}>
        {upright ? letter : <i>{letter}</i>}
        {below && (
          <sub className="text-[0.7em] leading-none">
            <i>{below}</i>
          </sub>
        )}
      </Fragment>
    );
  });
}
