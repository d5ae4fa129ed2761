import { useKeys } from "../../lib/use-keys.ts";

/** Escape leaves the page for the study, unless a field, a matrix or something laid over the page wants it. */
export function useEscape(leave: () => void): void {
  useKeys("page", {
    leave: ({ target }) => {
      if (!(target instanceof HTMLElement)) return false;
      if (target.closest("input, textarea, select, [contenteditable=true]")) return false;
      leave();
    },
  });
}
