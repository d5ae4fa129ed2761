import { type DragEvent, useState } from "react";
import { bandId } from "./addresses.ts";

/** Where a dragged cell would come to stand: after a cell, or before all (null). */
type Gap = string | null;

const TYPE = "application/x-tangency-cell";

/** Cells put in another order by dragging their names; menu and keys do the same. */
export function useBandDrag(ids: readonly string[], onMove: (cellId: string, after: Gap) => void) {
  const [dragged, setDragged] = useState<string>();
  const [gap, setGap] = useState<Gap>();
  const idAt = (event: DragEvent) => {
    const band = event.target instanceof Element ? event.target.closest("section.band") : null;
    return ids.find((id) => band?.id === bandId(id));
  };
  const end = () => {
    setDragged(undefined);
    setGap(undefined);
  };
  return {
    /** The cell before or after whose band the line is drawn. */
    edgeOf: (cellId: string): "before" | "after" | undefined => {
      if (dragged === undefined || gap === undefined) return undefined;
      if (gap === cellId) return "after";
      return gap === null && cellId === ids[0] ? "before" : undefined;
    },
    handlers: {
      onDragStart: (event: DragEvent) => {
        const id = event.target instanceof Element && event.target.closest("[data-drag]") ? idAt(event) : undefined;
        if (id === undefined) return;
        event.dataTransfer.setData(TYPE, id);
        event.dataTransfer.effectAllowed = "move";
        setDragged(id);
      },
      onDragOver: (event: DragEvent) => {
        const over = dragged === undefined ? undefined : idAt(event);
        if (over === undefined || !(event.target instanceof Element)) return;
        event.preventDefault();
        const box = event.target.closest("section.band")!.getBoundingClientRect();
        const isUpper = event.clientY < box.top + box.height / 2;
        setGap(isUpper ? (ids[ids.indexOf(over) - 1] ?? null) : over);
      },
      onDrop: (event: DragEvent) => {
        if (dragged === undefined || gap === undefined) return;
        event.preventDefault();
        const place = ids.indexOf(dragged);
        if (gap !== dragged && gap !== (ids[place - 1] ?? null)) onMove(dragged, gap);
        end();
      },
      onDragEnd: end,
    },
  };
}
