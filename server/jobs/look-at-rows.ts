import type { RowsPage } from "../../shared/schemas/rows.ts";
import type { Database } from "../db/client.ts";
import { rowsAbout } from "../engine/columns/rows-about.ts";
import { pageOf, wholeTable } from "../engine/columns/rows-page.ts";
import type { RunControl } from "../engine/run.ts";
import type { LookJob } from "./job.ts";
import { prepared, tableOf, type WorkerMemory } from "./run-cell.ts";

/** A page of rows of an upload, or of those that something found of a data cell is about. Errors: `Refusal`. */
export function lookAtRows(look: LookJob, db: Database, memory: WorkerMemory, control: RunControl): RowsPage {
  if (look.of === "upload") return pageOf(wholeTable(tableOf(look.uploadId, db, memory)), look.asked);
  const { data, about, asked } = look;
  const table = tableOf(data.uploadId, db, memory);
  const rows = rowsAbout(about, data.specification, table, () => prepared({ data }, db, memory, control));
  return pageOf(rows, asked);
}
