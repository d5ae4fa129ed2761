/** How long a link may open, as it is chosen. */
export const LINK_ENDS = [
  { value: "", words: "until it is revoked" },
  { value: "30", words: "for 30 days" },
  { value: "90", words: "for 90 days" },
  { value: "365", words: "for a year" },
] as const;

const DAY = 24 * 3_600_000;

/** The moment a link runs out, so many days from now; none where it opens until it is revoked. */
export function endOf(days: string, now = Date.now()): string | undefined {
  return days === "" ? undefined : new Date(now + Number(days) * DAY).toISOString();
}
