import { type RefObject, useLayoutEffect, useRef } from "react";

const HELD_MS = 1_200;

/**
 * Keeps the height of a finding for a moment after it has gone: a light cell's next finding is there at once, and the
 * page below must not jump twice for it.
 */
export function useHeldHeight(isFound: boolean): RefObject<HTMLDivElement | null> {
  const ref = useRef<HTMLDivElement>(null);
  const last = useRef(0);
  useLayoutEffect(() => {
    const element = ref.current;
    if (!element) return;
    if (isFound) {
      element.style.minHeight = "";
      const remember = () => {
        last.current = element.offsetHeight;
      };
      remember();
      if (typeof ResizeObserver === "undefined") return;
      const observer = new ResizeObserver(remember);
      observer.observe(element);
      return () => observer.disconnect();
    }
    if (last.current === 0) return;
    element.style.minHeight = `${last.current}px`;
    const timer = setTimeout(() => {
      element.style.minHeight = "";
    }, HELD_MS);
    return () => clearTimeout(timer);
  }, [isFound]);
  return ref;
}
