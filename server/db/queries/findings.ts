import { and, eq, inArray } from "drizzle-orm";
import type { Database } from "../client.ts";
import { user } from "../schema/auth.ts";
import { estimations } from "../schema/estimations.ts";
import { cellFindings, findings } from "../schema/findings.ts";

export type FindingRow = typeof findings.$inferSelect;

/** Without the finding itself, which may be large. */
export type FoundRow = Pick<FindingRow, "fingerprint" | "foundAt" | "tookMs">;

export interface LastFindingRow extends FoundRow {
  readonly cellId: string;
  readonly source: string;
  readonly by: string | null;
}

/** Of these fingerprints, those under which the study has a finding. */
export function foundAmong(db: Database, studyId: string, fingerprints: readonly string[]): FoundRow[] {
  if (fingerprints.length === 0) return [];
  return db
    .select({ fingerprint: findings.fingerprint, foundAt: findings.foundAt, tookMs: findings.tookMs })
    .from(findings)
    .where(and(eq(findings.studyId, studyId), inArray(findings.fingerprint, [...fingerprints])))
    .all();
}

export function findFinding(db: Database, studyId: string, fingerprint: string): FindingRow | undefined {
  return db
    .select()
    .from(findings)
    .where(and(eq(findings.studyId, studyId), eq(findings.fingerprint, fingerprint)))
    .get();
}

/** A finding once stored is never changed. */
export function insertFinding(db: Database, row: FindingRow): void {
  db.insert(findings).values(row).onConflictDoNothing().run();
}

/** The finding each cell last had, with the source that asked for it and the name of who did. */
export function lastFindings(db: Database, studyId: string): LastFindingRow[] {
  return db
    .select({
      cellId: cellFindings.cellId,
      source: cellFindings.source,
      fingerprint: cellFindings.fingerprint,
      foundAt: findings.foundAt,
      tookMs: findings.tookMs,
      by: user.name,
    })
    .from(cellFindings)
    .innerJoin(
      findings,
      and(eq(findings.studyId, cellFindings.studyId), eq(findings.fingerprint, cellFindings.fingerprint)),
    )
    .leftJoin(user, eq(user.id, cellFindings.userId))
    .where(eq(cellFindings.studyId, studyId))
    .all();
}

/** By cell id: the SHA-256 of the upload its last finding rested on. */
export function lastUploads(db: Database, studyId: string): Map<string, string> {
  const rows = db
    .select({ cellId: cellFindings.cellId, sha256: cellFindings.uploadSha256 })
    .from(cellFindings)
    .where(eq(cellFindings.studyId, studyId))
    .all();
  return new Map(rows.flatMap(({ cellId, sha256 }) => (sha256 === null ? [] : [[cellId, sha256] as const])));
}

export function setLastFinding(db: Database, row: typeof cellFindings.$inferInsert): void {
  const { source, fingerprint, userId, uploadSha256 = null, at } = row;
  db.insert(cellFindings)
    .values(row)
    .onConflictDoUpdate({
      target: [cellFindings.studyId, cellFindings.cellId],
      set: { source, fingerprint, userId, uploadSha256, at },
    })
    .run();
}

export type EstimationRow = typeof estimations.$inferSelect;

/** Estimations that have begun and not ended: at start, those that were interrupted. */
export function estimationsOf(db: Database, studyId: string): EstimationRow[] {
  return db.select().from(estimations).where(eq(estimations.studyId, studyId)).all();
}

export function beginEstimation(db: Database, row: EstimationRow): void {
  const { fingerprint, startedAt } = row;
  db.insert(estimations)
    .values(row)
    .onConflictDoUpdate({ target: [estimations.studyId, estimations.cellId], set: { fingerprint, startedAt } })
    .run();
}

export function endEstimation(db: Database, studyId: string, fingerprint: string): void {
  db.delete(estimations)
    .where(and(eq(estimations.studyId, studyId), eq(estimations.fingerprint, fingerprint)))
    .run();
}
