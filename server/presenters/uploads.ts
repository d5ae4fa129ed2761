import { type Upload, upload as uploadSchema } from "../../shared/schemas/resources.ts";
import type { DescribedUpload } from "../services/uploads.ts";

export function presentUpload({ upload, uploadedByName, descriptions }: DescribedUpload): Upload {
  return uploadSchema.parse({
    id: upload.id,
    name: upload.name,
    bytes: upload.bytes,
    rows: upload.rows,
    sha256: upload.sha256,
    version: upload.version,
    ...(upload.fileName !== null && { fileName: upload.fileName }),
    format: upload.format,
    ...(upload.sheet !== null && { sheet: upload.sheet }),
    ...(upload.sheets !== null && { sheets: JSON.parse(upload.sheets) }),
    ...(upload.separator !== null && { separator: upload.separator }),
    ...(upload.decimalComma !== null && { decimalComma: upload.decimalComma }),
    uploadedAt: upload.uploadedAt.toISOString(),
    uploadedBy: uploadedByName,
    columns: descriptions.map((description) => JSON.parse(description)),
  });
}
