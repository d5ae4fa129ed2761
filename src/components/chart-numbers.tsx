import { Table, type TableHead, type TableLine } from "./table.tsx";

interface ChartNumbersProps {
  readonly caption: string;
  readonly heads: readonly TableHead[];
  readonly lines: readonly TableLine[];
}

/** A figure's numbers as a table, one keystroke away. */
export function ChartNumbers({ caption, heads, lines }: ChartNumbersProps) {
  return (
    <details className="mt-1 type-small print:hidden">
      <summary className="word inline-block list-none">
        Numbers
        <span className="sr-only"> of {caption.charAt(0).toLowerCase() + caption.slice(1)}</span>
      </summary>
      <Table className="mt-2 max-h-80 max-w-xl overflow-y-auto" caption={caption} heads={heads} lines={lines} />
    </details>
  );
}
