import { useSyncExternalStore } from "react";

const media = (query: string) => (typeof matchMedia === "function" ? matchMedia(query) : undefined);

/** Whether a media query matches, followed as it changes. */
export function useMedia(query: string): boolean {
  return useSyncExternalStore(
    (changed) => {
      const list = media(query);
      list?.addEventListener("change", changed);
      return () => list?.removeEventListener("change", changed);
    },
    () => media(query)?.matches ?? false,
  );
}

/** A phone's width (below 600 CSS pixels), where matrices turn to thousandths. */
export function usePhone(): boolean {
  return useMedia("(max-width: 599.9px)");
}
