import { LinkWord } from "../components/button.tsx";
import { sentenceOf } from "../lib/api.ts";

interface LinkFaultProps {
  readonly error: unknown;
  /** Where another one is to be had. */
  readonly again: { readonly to: string; readonly words: string };
}

/** A link that opens nothing any more. */
export function LinkFault({ error, again }: LinkFaultProps) {
  return (
    <div role="alert">
      <p className="type-finding">{sentenceOf(error)}</p>
      <p className="pt-4">
        <LinkWord to={again.to}>{again.words}</LinkWord>
      </p>
    </div>
  );
}
