import { useEffect } from "react";

/** The window's title, from the particular to the general. */
export function usePageTitle(...parts: readonly (string | undefined)[]): void {
  const title = [...parts.filter(Boolean), "Tangency"].join(" · ");
  useEffect(() => {
    document.title = title;
  }, [title]);
}
