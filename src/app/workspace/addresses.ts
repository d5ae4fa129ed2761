/** Ids and addresses of bands within the study's page. */
export const bandId = (cellId: string) => `cell-${cellId}`;
export const addressOf = (cellId: string) => `#${bandId(cellId)}`;

/** Begins a remark on a cell, wherever its page has them. */
export function beginRemark(cellId: string): void {
  const words = document.getElementById(bandId(cellId))?.querySelectorAll<HTMLElement>("[data-begins-remark]") ?? [];
  // Of the two words the page shows one; without a layout, the first.
  const shown = [...words].find((word) => word.checkVisibility?.() ?? true);
  shown?.click();
}

/** Puts the focus on a band, and the band into view. */
export function focusBand(cellId: string): void {
  const band = document.getElementById(bandId(cellId));
  band?.focus({ preventScroll: true });
  // Without the smooth way: whoever holds J down goes faster than a page can glide.
  band?.scrollIntoView?.({ block: "nearest" });
}
