import { useQueryClient } from "@tanstack/react-query";
import { useEffect, useMemo, useState } from "react";
import { useStatus } from "../../features/findings/api/get-status.ts";
import { useUploads } from "../../features/uploads/api/list-uploads.ts";
import { useStudyPart } from "../../sync/index.ts";
import { firstFindingShown } from "./first-finding.ts";
import type { OpenStudy } from "./open-study.ts";
import { isSameStanding, type Standing } from "./standing.ts";
import { standingsTold } from "./told.ts";
import { useReading } from "./use-reading.ts";

const NONE: never[] = [];

/** Where every cell of the open study stands, followed as document, uploads and findings change. */
export function useStandings({ study, connection }: Pick<OpenStudy, "study" | "connection">) {
  const cells = useStudyPart(connection, "cells");
  const told = useStudyPart(connection, "status");
  const { data: first, isError: failed } = useStatus(study.id);
  const { data: uploads, error } = useUploads(study.id);
  const status = told ?? first;
  useUploadsOfOthers(study.id, cells, uploads);
  const asTold = useMemo(() => standingsTold(cells, status), [cells, status]);
  const reading = useReading(failed || (status !== undefined && asTold.some(({ isUnread }) => isUnread)));
  const resolved = useMemo(
    () => (reading && uploads ? reading.resolveHere(cells, uploads) : undefined),
    [reading, cells, uploads],
  );
  const standings = useUnchanged(
    useMemo(
      () => (reading && resolved ? reading.readStandings(cells, resolved, uploads ?? NONE, status) : asTold),
      [reading, cells, resolved, uploads, status, asTold],
    ),
  );
  useEffect(() => {
    // With nothing to wait for, what can wait need not.
    if (status && standings.every(({ fingerprint, isUnread }) => !fingerprint && !isUnread)) firstFindingShown();
  }, [status, standings]);
  useVersionsOfOthers(study.id, standings);
  return { standings, cells, uploads: uploads ?? NONE, error, isKnown: uploads !== undefined && status !== undefined };
}

/** Standings that say what they said before are the same objects as before. */
function useUnchanged(standings: readonly Standing[]): readonly Standing[] {
  const [before, setBefore] = useState<readonly Standing[]>(NONE);
  const kept = standings.map((now) => before.find((one) => isSameStanding(one, now)) ?? now);
  const isSame = kept.length === before.length && kept.every((one, place) => one === before[place]);
  if (!isSame) setBefore(kept);
  return isSame ? before : kept;
}

/**
 * A data cell whose text is as it was found, and whose finding the server has under another fingerprint than is asked
 * here, reads a version that a coauthor has just added.
 */
function useVersionsOfOthers(studyId: string, standings: readonly Standing[]) {
  const client = useQueryClient();
  const elsewhere = standings
    .filter(({ kind, state, status, cell }) => kind === "data" && state === "out of date" && isAsFound(status, cell))
    .map(({ status }) => status?.fingerprint)
    .join();
  useEffect(() => {
    if (elsewhere) void client.invalidateQueries({ queryKey: ["uploads", studyId] });
  }, [client, studyId, elsewhere]);
}

const isAsFound = (status: Standing["status"], { source }: Standing["cell"]) =>
  status?.state === "current" && status.last?.fingerprint === status.fingerprint && status.last?.source === source;

/** A cell that names an upload unknown here may name one a coauthor has just added. */
function useUploadsOfOthers(
  studyId: string,
  cells: readonly { kind: string; source: string }[],
  uploads: readonly { name: string }[] | undefined,
) {
  const client = useQueryClient();
  const named = useMemo(
    () =>
      cells
        .flatMap(({ kind, source }) => (kind === "data" ? (/^upload:\s*(.+?)\s*$/m.exec(source)?.[1] ?? []) : []))
        .map((name) => name.replace(/^(["'])(.*)\1$/, "$2")),
    [cells],
  );
  const unknown = uploads ? named.filter((name) => !uploads.some((upload) => upload.name === name)).join("\n") : "";
  useEffect(() => {
    if (unknown) void client.invalidateQueries({ queryKey: ["uploads", studyId] });
  }, [client, studyId, unknown]);
}
