/** Ids and addresses of bands within the study's page. */
export const bandId = (cellId: string) => `cell-${cellId}`;
export const addressOf = (cellId: string) => `#${bandId(cellId)}`;

/** Puts the focus on a band, and the band into view. */
export function focusBand(cellId: string): void {
  const band = document.getElementById(bandId(cellId));
  band?.focus({ preventScroll: true });
  // Without the smooth way: whoever holds J down goes faster than a page can glide.
  band?.scrollIntoView?.({ block: "nearest" });
}
