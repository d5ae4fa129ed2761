import { type DragEvent, useRef, useState } from "react";
import { bandId } from "./addresses.ts";

/** Where a dragged cell would come to stand: after a cell, or before all (null). */
type Gap = string | null;

const TYPE = "application/x-tangency-cell";

/** Cells put in another order by dragging their names; menu and keys do the same. */
export function useBandDrag(ids: readonly string[], onMove: (cellId: string, after: Gap) => void) {
  // Beside what is drawn: a drop may come before the page has been drawn for the last place passed over.
  const dragged = useRef<string>(undefined);
  const [gap, setGap] = useState<Gap>();
  const bandAt = ({ target }: DragEvent) => (target instanceof Element ? target.closest("section.band") : null);
  const idAt = (event: DragEvent) => {
    const band = bandAt(event);
    return ids.find((id) => band?.id === bandId(id));
  };
  /** Above the middle of a band is before its cell, below is after. */
  const gapAt = (event: DragEvent): Gap | undefined => {
    const over = dragged.current === undefined ? undefined : idAt(event);
    const box = bandAt(event)?.getBoundingClientRect();
    if (over === undefined || !box) return undefined;
    return event.clientY < box.top + box.height / 2 ? (ids[ids.indexOf(over) - 1] ?? null) : over;
  };
  const end = () => {
    dragged.current = undefined;
    setGap(undefined);
  };
  return {
    /** The edge of the band on which the line is drawn. */
    edgeOf: (cellId: string): "before" | "after" | undefined => {
      if (gap === undefined) return undefined;
      if (gap === cellId) return "after";
      return gap === null && cellId === ids[0] ? "before" : undefined;
    },
    handlers: {
      onDragStart: (event: DragEvent) => {
        const id = event.target instanceof Element && event.target.closest("[data-drag]") ? idAt(event) : undefined;
        if (id === undefined) return;
        event.dataTransfer.setData(TYPE, id);
        event.dataTransfer.effectAllowed = "move";
        dragged.current = id;
      },
      onDragOver: (event: DragEvent) => {
        const here = gapAt(event);
        if (here === undefined) return;
        event.preventDefault();
        setGap(here);
      },
      onDrop: (event: DragEvent) => {
        const here = gapAt(event);
        const moved = dragged.current;
        if (here !== undefined && moved !== undefined) {
          event.preventDefault();
          onMove(moved, here);
        }
        end();
      },
      onDragEnd: end,
    },
  };
}
