import {
  FIGURE_ASKS,
  FIGURE_NAMES,
  FIGURE_READS,
  type FigureName,
  type FigureReads,
} from "../../../shared/schemas/figure.ts";
import type { Value } from "../../../shared/study/edit.ts";
import { parseCell } from "../../../shared/study/parse-cell.ts";
import { dataBelow } from "../form/point-fields.tsx";
import type { KeyPath, Written } from "../form/written.ts";
import type { FormProps } from "../types.ts";

export const isFigure = (word: string): word is FigureName => (FIGURE_NAMES as readonly string[]).includes(word);

/** What a source shows; nothing while it names no figure. */
export function shownBy(written: Pick<Written, "text">): FigureName | undefined {
  const show = written.text("show");
  return isFigure(show) ? show : undefined;
}

type Edits = (readonly [KeyPath, Value | undefined])[];

/**
 * The edits that turn a source to another figure: the cell it is drawn of where that is of another kind (the one named
 * before, or the last of the study), and out with keys that mean nothing to it.
 */
export function newFigure(show: FigureName, written: Written, cells: FormProps["context"]["cells"]): Edits {
  const asks = FIGURE_ASKS[show];
  const other = FIGURE_READS.filter((key) => key !== asks.reads);
  const last = cells.findLast(({ kind }) => kind === asks.reads)?.name ?? "";
  const goods = written.list("goods");
  const keepsGoods = asks.goods === "some" || (asks.goods === "one" && goods.length === 1);
  return [
    ...other.map((key): Edits[number] => [[key], undefined]),
    ...(written.text(asks.reads) === "" ? [[[asks.reads], last] as Edits[number]] : []),
    [["show"], show],
    ...(keepsGoods
      ? []
      : [[["goods"], asks.goods === "one" && goods.length > 1 ? [goods[0]] : undefined] as Edits[number]]),
    ...(asks.at ? [] : [[["at"], undefined] as Edits[number]]),
    ...(asks.groups ? [] : [[["groups"], undefined] as Edits[number]]),
  ];
}

/** The data cell beneath what a figure is drawn of, as its source is written. */
export function dataOfFigure(written: Pick<Written, "text">, reads: FigureReads, context: FormProps["context"]) {
  const sourceOf = (kind: FigureReads, name: string) => {
    const cell = context.cells.find((one) => one.kind === kind && one.name === name);
    return cell ? parseCell(kind, cell.source).written : {};
  };
  if (reads === "data") return sourceOf("data", written.text("data"));
  if (reads === "system") return dataBelow(context, written.text("system"));
  return dataBelow(context, String(sourceOf("price change", written.text("price change")).system ?? ""));
}
