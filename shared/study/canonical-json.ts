/**
 * The one text of a JSON value: keys sorted by their UTF-16 units, no spaces, numbers as the shortest
 * text that reads back as the same double (as in RFC 8785). Members that are undefined are left out.
 * Refuses what JSON cannot hold: NaN, infinities, functions, and undefined in a list.
 */
export function canonicalJson(value: unknown): string {
  if (value === null || typeof value === "boolean" || typeof value === "string") return JSON.stringify(value);
  if (typeof value === "number") {
    if (!Number.isFinite(value)) throw new TypeError(`canonical JSON has no ${value}`);
    return JSON.stringify(value);
  }
  if (Array.isArray(value)) return `[${value.map(canonicalJson).join(",")}]`;
  if (typeof value !== "object") throw new TypeError(`canonical JSON has no ${typeof value}`);
  const entries = Object.entries(value).filter(([, member]) => member !== undefined);
  entries.sort(([a], [b]) => (a < b ? -1 : a > b ? 1 : 0));
  return `{${entries.map(([key, member]) => `${JSON.stringify(key)}:${canonicalJson(member)}`).join(",")}}`;
}
