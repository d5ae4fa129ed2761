import type { RefereeCopySummary } from "../../../shared/schemas/referee-copies.ts";
import { listWords } from "../../../shared/study/words.ts";
import { dateInWords, whenInWords } from "../../lib/dates.ts";

const hasRunOut = ({ expiresAt }: RefereeCopySummary, now = Date.now()) =>
  expiresAt !== undefined && Date.parse(expiresAt) <= now;

/** Its link opens, and no newer copy stands in its place. */
export const isOpen = (copy: RefereeCopySummary): boolean =>
  copy.revokedAt === undefined && copy.replacedBy === undefined && !hasRunOut(copy);

/** One among several, in a line: "matrix, 9 March, 7c1e". */
export const copyInWords = ({ cellName, sealedAt, fingerprint }: RefereeCopySummary): string =>
  `${cellName}, ${whenInWords(sealedAt)}, ${fingerprint.slice(0, 4)}`;

/** What was sealed: "matrix with laws and fifths". */
export const whatIsSealed = ({ cellName, also }: RefereeCopySummary): string =>
  also.length === 0 ? cellName : `${cellName} with ${listWords(also)}`;

/** What has become of a copy: whether it was opened, until when it can be, what stands in its place. */
export function fateOf(copy: RefereeCopySummary, copies: readonly RefereeCopySummary[]): string {
  const { revokedAt, lastOpenedAt, expiresAt, replacedBy } = copy;
  if (revokedAt) return `revoked ${whenInWords(revokedAt)}`;
  const opened = lastOpenedAt ? `last opened ${whenInWords(lastOpenedAt)}` : "not opened yet";
  const newer = copies.find(({ id }) => id === replacedBy);
  const replaced = newer && `replaced by that of ${whenInWords(newer.sealedAt)}`;
  const end =
    expiresAt && (hasRunOut(copy) ? `run out ${dateInWords(expiresAt)}` : `opens until ${dateInWords(expiresAt)}`);
  return [opened, end, replaced].filter(Boolean).join("; ");
}
