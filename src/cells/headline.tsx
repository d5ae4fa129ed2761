import type { ReactNode } from "react";
import { Printed } from "../components/number.tsx";

/** The finding in one sentence, set for a band or for an opened cell. */
export function Headline({ sentence, opened = false }: { sentence: string; opened?: boolean }) {
  return (
    <p className={`max-w-[62ch] text-pretty ${opened ? "type-finding-open" : "type-finding"}`}>
      <Printed text={sentence} />
    </p>
  );
}

/** The head of an opened cell: the sentence, and at its right the ways of copying. */
export function OpenHead({ sentence, children }: { sentence: string; children?: ReactNode }) {
  return (
    <div className="flex flex-col-reverse gap-x-8 gap-y-2 min-[900px]:flex-row min-[900px]:items-start min-[900px]:justify-between">
      <Headline sentence={sentence} opened />
      <div className="shrink-0">{children}</div>
    </div>
  );
}
