import type { StudyConnection } from "../../sync/index.ts";
import { loadReading } from "./use-reading.ts";

/** Gives a good of a data cell another name, and the cells that name it with it, as one step. */
export async function renameGoodEverywhere(
  connection: StudyConnection,
  cellId: string,
  from: string,
  to: string,
): Promise<void> {
  const { sourcesAfterRenamingGood } = await loadReading();
  const { cells } = connection.snapshot();
  const data = cells.find(({ id }) => id === cellId);
  if (!data) return;
  const sources = sourcesAfterRenamingGood(data, from, to, cells);
  connection.atOnce(
    "renaming",
    () => {
      for (const [id, source] of sources) connection.replaceSource(id, source);
    },
    `the good ${from}`,
  );
}
