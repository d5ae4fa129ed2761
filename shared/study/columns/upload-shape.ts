import type { Upload } from "../../schemas/resources.ts";

/** What is known of an upload before its rows are read. */
export interface UploadShape extends Pick<Upload, "name" | "sha256"> {
  readonly version?: number;
  readonly rows?: number;
  readonly columns: readonly Pick<Upload["columns"][number], "name" | "type">[];
}
