import { useId } from "react";
import type { SealedMethods as Sealed } from "../../../shared/schemas/referee-copy.ts";

/** The methods of the sealed systems as a paper would say them, each with the works it cites. */
export function SealedMethods({ methods }: { methods: readonly Sealed[] }) {
  return methods.map((one) => <OneSystem key={one.system} one={one} />);
}

function OneSystem({ one: { system, text, references } }: { one: Sealed }) {
  const id = useId();
  return (
    <section aria-labelledby={id} className="border-line border-t pt-4">
      <h2 id={id} className="mb-3">
        <span className="type-cell-name">{system}</span> <i className="type-kind">methods</i>
      </h2>
      <p className="type-prose text-pretty">{text}</p>
      {references.length > 0 && (
        <ul aria-label={`References of the methods of ${system}`} className="type-small mt-4 grid gap-1 text-ink2">
          {references.map((reference) => (
            <li key={reference} className="pl-[1.2em] -indent-[1.2em]">
              {reference}
            </li>
          ))}
        </ul>
      )}
    </section>
  );
}
