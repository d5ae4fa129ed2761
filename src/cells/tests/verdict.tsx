import { VerdictFigure, type VerdictShape } from "../../components/verdict-figure.tsx";

/** The figure of a verdict and its word, in a line of a table. */
export function VerdictWord({ figure, word }: { figure: VerdictShape; word: string }) {
  return (
    <span className="flex items-center gap-2 whitespace-nowrap font-semibold">
      <VerdictFigure shape={figure} />
      {word}
    </span>
  );
}
