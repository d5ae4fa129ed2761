import { type Upload, upload as uploadSchema } from "../../shared/schemas/resources.ts";
import type { DescribedUpload } from "../services/uploads.ts";

export function presentUpload({ upload, uploadedByName, descriptions }: DescribedUpload): Upload {
  return uploadSchema.parse({
    id: upload.id,
    name: upload.name,
    bytes: upload.bytes,
    rows: upload.rows,
    sha256: upload.sha256,
    separator: upload.separator,
    decimalComma: upload.decimalComma,
    uploadedAt: upload.uploadedAt.toISOString(),
    uploadedBy: uploadedByName,
    columns: descriptions.map((description) => JSON.parse(description)),
  });
}
