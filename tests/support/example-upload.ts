import type { Upload } from "../../shared/schemas/resources.ts";

/** An upload of numbers with these columns, and a village in words; columns named q_… have three zeros each. */
export function exampleUpload(names: readonly string[]): Upload {
  return {
    id: "u",
    name: "purchases.csv",
    bytes: 1,
    rows: 100,
    sha256: "",
    version: 1,
    format: "csv",
    separator: ",",
    decimalComma: false,
    uploadedAt: "2032-03-01T09:00:00.000Z",
    uploadedBy: "Ilse Marchetti",
    columns: names.map((name) => ({
      name,
      type: name === "village" ? "text" : "number",
      missing: 0,
      distinct: 50,
      zeros: name.startsWith("q_") ? 3 : 0,
    })),
  };
}
