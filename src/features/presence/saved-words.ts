import { counted } from "../../../shared/study/words.ts";
import { whenInWords } from "../../lib/dates.ts";
import type { ConnectionState, StoredState } from "../../sync/index.ts";

/** What the top bar says of the connection: "Saved 14:08", "Working alone since 14:20, 3 edits kept here". */
export function savedInWords(
  connection: ConnectionState,
  stored: StoredState,
  savedAt: number | string,
  readOnly: boolean,
): string {
  if (connection.state === "refused") return connection.sentence;
  if (connection.state === "working alone") {
    const since = `since ${whenInWords(connection.since)}`;
    if (readOnly) return `Without a connection ${since}`;
    const kept = connection.editsKept === 0 ? "" : `, ${keptHere(connection.editsKept)}`;
    return `Working alone ${since}${kept}`;
  }
  if (connection.state === "connecting") {
    return stored.unstored === 0 ? "Connecting" : `Connecting, ${keptHere(stored.unstored)}`;
  }
  if (readOnly) return "Reading along";
  return stored.everything ? `Saved ${whenInWords(savedAt)}` : "Saving…";
}

const keptHere = (edits: number) => `${counted(edits, "edit")} kept here`;
