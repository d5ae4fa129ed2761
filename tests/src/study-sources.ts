import type { Upload } from "../../shared/schemas/resources.ts";
import type { CellSource } from "../../shared/study/cell-source.ts";

const column = (name: string) => ({ name, type: "number" as const, missing: 0, distinct: 100 });

/** A small upload and a study of three cells on it: data, system, matrix. */
export const upload: Upload = {
  id: "u",
  name: "purchases-2031.csv",
  bytes: 1000,
  rows: 4938,
  sha256: "a".repeat(64),
  version: 1,
  format: "csv",
  separator: ",",
  decimalComma: false,
  uploadedAt: "2031-03-02T10:00:00.000Z",
  uploadedBy: "Ilse Marchetti",
  columns: ["p_grains", "e_grains", "p_dairy", "e_dairy", "members"].map(column),
};

const SURVEY = `upload: purchases-2031.csv
goods:
  grains: {price: p_grains, expenditure: e_grains}
  dairy: {price: p_dairy, expenditure: e_dairy}
keep: members <= 12
`;

export const studyCells = (): CellSource[] => [
  { id: "s", name: "survey", kind: "data", order: "a0", source: SURVEY },
  {
    id: "b",
    name: "base",
    kind: "system",
    order: "a1",
    source: "data: survey\nform: aids\nimpose: [homogeneity, symmetry]\n",
  },
  { id: "m", name: "matrix", kind: "slutsky", order: "a2", source: "system: base\nat: {x: quantile 0.9}\n" },
];
