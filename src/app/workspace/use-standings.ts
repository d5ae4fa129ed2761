import { useQueryClient } from "@tanstack/react-query";
import { useEffect, useMemo } from "react";
import { fingerprintCells } from "../../../shared/study/fingerprints.ts";
import { resolveCells } from "../../../shared/study/resolve.ts";
import { useStatus } from "../../features/findings/api/get-status.ts";
import { useUploads } from "../../features/uploads/api/list-uploads.ts";
import { useStudyPart } from "../../sync/index.ts";
import type { OpenStudy } from "./open-study.ts";
import { standingsOf } from "./standing.ts";

const NONE: never[] = [];

/** Where every cell of the open study stands, followed as document, uploads and findings change. */
export function useStandings({ study, connection }: Pick<OpenStudy, "study" | "connection">) {
  const cells = useStudyPart(connection, "cells");
  const told = useStudyPart(connection, "status");
  const { data: first } = useStatus(study.id);
  const { data: uploads, error } = useUploads(study.id);
  const status = told ?? first;
  useUploadsOfOthers(study.id, cells, uploads);
  const resolved = useMemo(() => (uploads ? resolveCells(cells, uploads) : NONE), [cells, uploads]);
  const standings = useMemo(
    () => standingsOf(cells, resolved, fingerprintCells(resolved, uploads ?? NONE), status),
    [cells, resolved, uploads, status],
  );
  return { standings, cells, uploads: uploads ?? NONE, error, isKnown: uploads !== undefined && status !== undefined };
}

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
