import { useEffect } from "react";

/** Escape leaves the page for the study, unless a field, a matrix or something laid over the page wants it. */
export function useEscape(leave: () => void): void {
  useEffect(() => {
    const onKeyDown = (event: KeyboardEvent) => {
      if (event.key !== "Escape" || event.defaultPrevented || !(event.target instanceof HTMLElement)) return;
      if (event.target.closest("[role=dialog], [role=menu], input, textarea, select, [contenteditable=true]")) return;
      leave();
    };
    document.addEventListener("keydown", onKeyDown);
    return () => document.removeEventListener("keydown", onKeyDown);
  }, [leave]);
}
