import type { DataSpecification } from "../../schemas/data.ts";
import type { Problem } from "../../schemas/problem.ts";
import type { KeyPath } from "../cell-source.ts";
import { nearestWord } from "../nearest-word.ts";
import { latestUploads, uploadRead, versionOf, versionsOf } from "../uploads.ts";
import { listSome, listWords } from "../words.ts";
import { type Context, MOST_TOLD, noColumn, teller } from "./tell.ts";

/** An upload or a version that is not there, and columns it does not have. */
export function dataProblems(specification: DataSpecification, { places, uploads }: Context): Problem[] {
  const tell = teller(places);
  const upload = uploadRead(uploads, specification);
  const versions = versionsOf(uploads, specification.upload).map(versionOf);
  if (!upload && versions.length > 0) return [tell(["version"], ...noVersion(specification, versions))];
  if (!upload) {
    const names = latestUploads(uploads).map(({ name }) => name);
    const nearest = nearestWord(specification.upload, names);
    const there = names.length === 0 ? "Nothing has been uploaded yet" : `There are ${listSome(names)}`;
    return [
      tell(
        ["upload"],
        `No upload is called ${specification.upload}. ${nearest ? `The nearest is ${nearest}` : there}.`,
        nearest,
      ),
    ];
  }
  const derived = Object.keys(specification.derive ?? {});
  const names = [...upload.columns.map(({ name }) => name), ...derived];
  const known = new Set(names);
  const used: [KeyPath, string][] = [];
  for (const [good, mapping] of Object.entries(specification.goods)) {
    for (const [key, column] of Object.entries(mapping)) used.push([["goods", good, key], column]);
  }
  for (const key of ["total", "weight", "cluster", "time"] as const) {
    const column = specification[key];
    if (column !== undefined) used.push([[key], column]);
  }
  return used
    .filter(([, column]) => !known.has(column))
    .slice(0, MOST_TOLD)
    .map(([path, column]) => tell(path, ...noColumn(upload.name, column, names)));
}

function noVersion({ upload, version }: DataSpecification, versions: readonly number[]): [string, string] {
  const latest = versions[0];
  const there =
    versions.length === 1
      ? `Its only version is ${latest}`
      : `It has the versions ${listWords(versions.toReversed().map(String))}`;
  return [`${upload} has no version ${version}. ${there}.`, String(latest)];
}
