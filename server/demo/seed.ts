import type { CellKind } from "../../shared/schemas/cell.ts";
import type { CellStatus, StudyStatus } from "../../shared/schemas/status.ts";
import type { Database } from "../db/client.ts";
import { insertPerson } from "../db/queries/people.ts";
import { countStudies, deleteStudy, findStudy, insertStudy } from "../db/queries/studies.ts";
import type { Services } from "../services/index.ts";
import { DEMO_PEOPLE } from "./people.ts";
import { seedDemoRemarks } from "./remarks.ts";

export interface DemoStudy {
  readonly title: string;
  readonly lede: string;
  readonly upload: { readonly name: string; readonly csv: string };
  readonly cells: readonly { readonly name: string; readonly kind: CellKind; readonly source: string }[];
}

interface Collaborators {
  readonly db: Database;
  readonly services: Pick<Services, "uploads" | "cells">;
  /** Writes the cells into the study's document, all or none. */
  readonly write: (studyId: string, cells: DemoStudy["cells"]) => Promise<void>;
  readonly say: (line: string) => void;
}

const STUDY = "demo";

/** Whether the demo study is to be made: there is no study at all, or its making was cut short. */
export function needsDemoStudy(db: Database, hasCells: (studyId: string) => boolean): boolean {
  if (countStudies(db) === 0) return true;
  return findStudy(db, STUDY) !== undefined && !hasCells(STUDY);
}

/** Makes the study, its upload and its cells, and has its findings computed once. */
export async function seedDemoStudy(demo: DemoStudy, ids: readonly string[], needs: Collaborators): Promise<void> {
  const { db, services, write, say } = needs;
  const now = new Date();
  const owner = { id: ids[0] };
  deleteStudy(db, STUDY);
  db.transaction((tx) => {
    insertStudy(tx, { id: STUDY, title: demo.title, lede: demo.lede, createdAt: now, changedAt: now });
    DEMO_PEOPLE.forEach(({ role }, i) => {
      insertPerson(tx, STUDY, ids[i], role, new Date(now.getTime() + i));
    });
  });
  say(`Making the demo study: reading ${demo.upload.name}.`);
  const uploadId = await services.uploads.store(owner, STUDY, demo.upload.name, bytesOf(demo.upload.csv));
  await services.uploads.finish(STUDY, uploadId, new AbortController().signal);
  await write(STUDY, demo.cells);
  services.cells.changed(STUDY);
  const { cells } = await services.cells.status(STUDY);
  const named = cells.map(({ cellId, name }) => ({ id: cellId, name }));
  seedDemoRemarks(db, STUDY, named, ids);
  await services.cells.bringUpToDate(STUDY, owner.id);
  await untilSettled(services, say);
}

async function* bytesOf(text: string): AsyncGenerator<Uint8Array> {
  yield Buffer.from(text);
}

/** Follows the first estimations; a cell that fails is said, and left as it is. */
async function untilSettled(services: Pick<Services, "cells">, say: (line: string) => void): Promise<void> {
  const told = new Set<string>();
  for (;;) {
    const { cells }: StudyStatus = await services.cells.status(STUDY);
    for (const cell of cells) {
      const line = lineOf(cell);
      if (line === undefined || told.has(line)) continue;
      told.add(line);
      say(line);
    }
    if (cells.every(({ state }) => state === "current" || state === "failed")) return;
    await new Promise((resolve) => setTimeout(resolve, 100));
  }
}

function lineOf({ name, state, because }: CellStatus): string | undefined {
  if (state === "estimating") return `  ${name}: estimating`;
  if (state === "current") return `  ${name}: found`;
  return state === "failed" ? `  ${name}: ${because ?? "failed"}` : undefined;
}
