import { type RefObject, useLayoutEffect, useRef, useState } from "react";

/** The width a drawing has, in CSS pixels; until measured, the one it is drawn for. */
export function useChartWidth<E extends Element>(drawnFor: number): [RefObject<E | null>, number] {
  const ref = useRef<E>(null);
  const [width, setWidth] = useState(drawnFor);
  useLayoutEffect(() => {
    const element = ref.current;
    if (!element || typeof ResizeObserver === "undefined") return;
    const observer = new ResizeObserver(([entry]) => setWidth(Math.max(120, Math.floor(entry.contentRect.width))));
    observer.observe(element);
    return () => observer.disconnect();
  }, []);
  return [ref, width];
}
