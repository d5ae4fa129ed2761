import { useCallback, useState } from "react";
import { useMedia } from "../../components/use-media.ts";
import type { SourcePage } from "./band-source.tsx";

/** Whether the study is one column: the source is then a strip that opens in its place. */
export const useOneColumn = () => useMedia("(max-width: 1023.9px)");

/** Systems and prose are read as text, the others as forms, until a person says otherwise. */
export const firstPage = (kind: string | null | undefined): SourcePage =>
  kind === "system" || kind === "text" ? "text" : "form";

/** Which page of each cell's source is open. */
export function useSourcePages() {
  const oneColumn = useOneColumn();
  const [chosen, setChosen] = useState<ReadonlyMap<string, SourcePage>>(new Map());
  const pageOf = (cell: { id: string; kind: string }): SourcePage =>
    chosen.get(cell.id) ?? (oneColumn ? "closed" : firstPage(cell.kind));
  const choose = useCallback(
    (cellId: string, page: SourcePage) => setChosen((before) => new Map(before).set(cellId, page)),
    [],
  );
  return {
    pageOf,
    /** On one column, the word in use puts the source away again. */
    choose: (cellId: string, page: SourcePage) =>
      choose(cellId, oneColumn && chosen.get(cellId) === page ? "closed" : page),
    swap: (cell: { id: string; kind: string }) => choose(cell.id, pageOf(cell) === "text" ? "form" : "text"),
  };
}
