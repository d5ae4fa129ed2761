import type { RefereeCopySummary } from "../../shared/schemas/referee-copies.ts";
import type { RefereeCopySummaryRow } from "../services/referee-copies.ts";

export function presentRefereeCopy(copy: RefereeCopySummaryRow): RefereeCopySummary {
  return {
    id: copy.id,
    cellName: copy.cellName,
    also: copy.also,
    note: copy.note,
    fingerprint: copy.fingerprint,
    sealedAt: copy.sealedAt.toISOString(),
    sealedBy: copy.sealedByName ?? "someone no longer here",
    ...(copy.expiresAt !== null && { expiresAt: copy.expiresAt.toISOString() }),
    ...(copy.replacedBy !== null && { replacedBy: copy.replacedBy }),
    ...(copy.revokedAt !== null && { revokedAt: copy.revokedAt.toISOString() }),
    ...(copy.lastOpenedAt !== null && { lastOpenedAt: copy.lastOpenedAt.toISOString() }),
  };
}
