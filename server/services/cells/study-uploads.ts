import type { UploadColumn } from "../../../shared/schemas/resources.ts";
import type { UploadShape } from "../../../shared/study/columns.ts";
import type { Database } from "../../db/client.ts";
import { uploadsOf } from "../../db/queries/uploads.ts";

export interface StudyUpload extends UploadShape {
  readonly id: string;
  readonly rows: number;
}

/** A study's uploads as its cells see them: names, columns and a hash of the bytes, no values. */
export function studyUploads(db: Database, studyId: string): StudyUpload[] {
  return uploadsOf(db, studyId).flatMap(({ upload, descriptions }) => {
    const { id, name, version, sha256, rows } = upload;
    if (sha256 === null || rows === null) return [];
    const columns = descriptions.map((text) => {
      const { name, type } = JSON.parse(text) as UploadColumn;
      return { name, type };
    });
    return [{ id, name, version, sha256, rows, columns }];
  });
}
