import type { CellSpecification } from "../schemas/cell.ts";
import type { DataSpecification } from "../schemas/data.ts";
import { type ElasticitiesSpecification, TOTAL_EXPENDITURE } from "../schemas/elasticities.ts";
import type { FigureSpecification } from "../schemas/figure.ts";
import { EXPENDITURE_PER_ADULT, type PriceChangeSpecification } from "../schemas/price-change.ts";
import type { Problem } from "../schemas/problem.ts";
import type { Upload } from "../schemas/resources.ts";
import type { SlutskySpecification } from "../schemas/slutsky.ts";
import type { SystemSpecification } from "../schemas/system.ts";
import type { KeyPath, Places } from "./cell-source.ts";
import { nearestWord } from "./nearest-word.ts";
import { latestUploads, uploadRead, versionOf, versionsOf } from "./uploads.ts";
import { counted, listSome, listWords } from "./words.ts";

/** What is known of an upload before its rows are read. */
export interface UploadShape extends Pick<Upload, "name" | "sha256"> {
  readonly version?: number;
  readonly rows?: number;
  readonly columns: readonly Pick<Upload["columns"][number], "name" | "type">[];
}

interface Context {
  readonly specification: CellSpecification;
  readonly places: Places;
  readonly specifications: ReadonlyMap<string, CellSpecification>;
  readonly uploads: readonly UploadShape[];
}

/** With a wrong upload everything is unknown: so many are told at once, and looking for the nearest takes time. */
const MOST_TOLD = 20;

/** Columns and goods a specification names that are not there, each with the nearest that is. */
export function columnProblems(context: Context): Problem[] {
  const { specification } = context;
  if (specification.kind === "data") return dataProblems(specification, context);
  if (specification.kind === "system") return systemProblems(specification, context);
  if (specification.kind === "slutsky") return priceProblems(specification.at, specification.system, context);
  if (specification.kind === "price change") return priceChangeProblems(specification, context);
  if (specification.kind === "figure") return figureProblems(specification, context);
  return specification.kind === "elasticities" ? elasticitiesProblems(specification, context) : [];
}

function teller(places: Places) {
  return (path: KeyPath, sentence: string, nearest?: string): Problem => {
    const place = places.value(path) ?? places.key(path);
    return { sentence, key: path.map(String), ...(place && { place }), ...(nearest && { nearest }) };
  };
}

function dataProblems(specification: DataSpecification, { places, uploads }: Context): Problem[] {
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

function noColumn(owner: string, column: string, names: readonly string[]): [string, string?] {
  const nearest = nearestWord(column, names);
  const there = nearest ? `The nearest is ${nearest}` : `Its columns are ${listSome(names)}`;
  return [`${owner} has no column ${column}. ${there}.`, nearest];
}

function systemProblems(specification: SystemSpecification, context: Context): Problem[] {
  const tell = teller(context.places);
  const data = context.specifications.get(specification.data);
  if (data?.kind !== "data") return [];
  const problems: Problem[] = [];
  const upload = uploadRead(context.uploads, data);
  if (upload) {
    const numeric = upload.columns.filter(({ type }) => type === "number").map(({ name }) => name);
    const names = [...numeric, ...Object.keys(data.derive ?? {})];
    const known = new Set(names);
    for (const [path, column] of numbersNamed(specification)) {
      if (known.has(column) || problems.length >= MOST_TOLD) continue;
      const isText = upload.columns.some(({ name, type }) => name === column && type === "text");
      const text = `${column} of ${specification.data} is a text column; ${path[0]} need numbers: derive one, such as ${column} == "…".`;
      problems.push(tell(path, ...(isText ? ([text] as [string]) : noColumn(specification.data, column, names))));
    }
    const cluster = clusterNamed(specification);
    const all = [...upload.columns.map(({ name }) => name), ...Object.keys(data.derive ?? {})];
    if (cluster !== undefined && !all.includes(cluster)) {
      problems.push(tell(["standard errors", "cluster"], ...noColumn(specification.data, cluster, all)));
    }
  }
  const goods = Object.keys(data.goods);
  if (specification.dropped !== undefined && !goods.includes(specification.dropped)) {
    problems.push(tell(["dropped"], ...noGood(specification.data, specification.dropped, goods)));
  }
  return problems;
}

/** The columns of numbers a system names, each with its place. */
function numbersNamed({ demographics, instruments = [], zeros }: SystemSpecification): [KeyPath, string][] {
  const participation = zeros === undefined || zeros === "two-step" ? [] : zeros["two-step"];
  return [
    ...demographics.map((column, i): [KeyPath, string] => [["demographics", i], column]),
    ...instruments.map((column, i): [KeyPath, string] => [["instruments", i], column]),
    ...participation.map((column, i): [KeyPath, string] => [["zeros", "two-step", i], column]),
  ];
}

/** The column of `cluster`, beside clustered standard errors or a bootstrap of clusters. */
function clusterNamed({ "standard errors": errors }: SystemSpecification): string | undefined {
  return typeof errors === "string" ? undefined : errors.cluster;
}

function noGood(owner: string, good: string, goods: readonly string[]): [string, string?] {
  const nearest = nearestWord(good, goods);
  const there = nearest ? `The nearest is ${nearest}` : `Its goods are ${listSome(goods)}`;
  return [`${owner} has no good ${good}. ${there}.`, nearest];
}

function elasticitiesProblems(specification: ElasticitiesSpecification, context: Context): Problem[] {
  const { at, groups, index, system: name } = specification;
  const tell = teller(context.places);
  const system = context.specifications.get(name);
  const problems = at === undefined ? [] : priceProblems(at, name, context);
  if (system?.kind === "system" && index === "exact" && (system.form !== "la-aids" || system.index !== "stone")) {
    const found = system.form === "la-aids" ? `la-aids with ${system.index ?? "tornqvist"}` : system.form;
    problems.push(
      tell(
        ["index"],
        `exact lets the weights of Stone's index in la-aids move; ${name} is ${found}. Write held.`,
        "held",
      ),
    );
  }
  problems.push(...withinProblems(specification, context));
  const data = system?.kind === "system" ? context.specifications.get(system.data) : undefined;
  return data?.kind === "data" ? [...problems, ...groupProblems(groups, data, context, [TOTAL_EXPENDITURE])] : problems;
}

/** A broader system that does not have the group as a good, is the group's own, or is of a group itself. */
function withinProblems(specification: ElasticitiesSpecification, context: Context): Problem[] {
  const { system: name, within, as } = specification;
  if (within === undefined || as === undefined) return [];
  const tell = teller(context.places);
  if (within === name) return [tell(["within"], `within names a broader system than ${name} itself.`)];
  const [own, broader] = [context.specifications.get(name), context.specifications.get(within)];
  if (own?.kind !== "system" || broader?.kind !== "system") return [];
  const problems: Problem[] = [];
  const group = own["conditional on"];
  if (group !== undefined && group !== as) {
    problems.push(tell(["as"], `${name} is conditional on ${group}, and as names ${as}: they are one group.`, group));
  }
  const whole = broader["conditional on"];
  if (whole !== undefined) {
    problems.push(
      tell(["within"], `${within} is itself conditional on ${whole}: name the system of the whole budget.`),
    );
  }
  const data = context.specifications.get(broader.data);
  if (data?.kind === "data" && !Object.hasOwn(data.goods, as)) {
    problems.push(tell(["as"], ...noGood(broader.data, as, Object.keys(data.goods))));
  }
  return problems;
}

/** Groups by a column that is not there; `others` are what else may be named in its place. */
function groupProblems(
  groups: ElasticitiesSpecification["groups"],
  data: DataSpecification,
  context: Context,
  others: readonly string[],
): Problem[] {
  const upload = uploadRead(context.uploads, data);
  if (groups === undefined || upload === undefined || others.includes(groups.of)) return [];
  const tell = teller(context.places);
  const problems: Problem[] = [];
  const column = upload.columns.find((one) => one.name === groups.of);
  const derived = Object.keys(data.derive ?? {});
  const names = [...upload.columns.map((one) => one.name), ...derived, ...others];
  if (!names.includes(groups.of)) problems.push(tell(["groups", "of"], ...noColumn(data.upload, groups.of, names)));
  if (groups.quantiles !== undefined && column?.type === "text" && !derived.includes(groups.of)) {
    problems.push(tell(["groups", "quantiles"], `${groups.of} is a text column and has no quantiles.`));
  }
  return problems;
}

/** Goods that are not there, and columns of groups and of needs. */
function priceChangeProblems(specification: PriceChangeSpecification, context: Context): Problem[] {
  const { at, system: name, prices, groups, "equivalence scale": scale } = specification;
  const tell = teller(context.places);
  const system = context.specifications.get(name);
  const data = system?.kind === "system" ? context.specifications.get(system.data) : undefined;
  if (system?.kind !== "system" || data?.kind !== "data") return [];
  const goods = Object.keys(data.goods);
  const unknown = Object.keys(prices).filter((good) => !goods.includes(good));
  const problems = unknown.slice(0, MOST_TOLD).map((good): Problem => {
    const [sentence, nearest] = noGood(
      system.data,
      good,
      goods.filter((other) => !Object.hasOwn(prices, other)),
    );
    const place = context.places.key(["prices", good]);
    return { sentence, key: ["prices", good], ...(place && { place }), ...(nearest && { nearest }) };
  });
  const upload = uploadRead(context.uploads, data);
  const isRoot = typeof scale === "object";
  const column = isRoot ? scale["square root of"] : scale;
  if (upload !== undefined && column !== undefined) {
    const numeric = upload.columns.filter(({ type }) => type === "number").map((one) => one.name);
    const names = [...numeric, ...Object.keys(data.derive ?? {})];
    const path = isRoot ? ["equivalence scale", "square root of"] : ["equivalence scale"];
    if (!names.includes(column)) problems.push(tell(path, ...noColumn(system.data, column, names)));
  }
  return [
    ...priceProblems(at, name, context),
    ...problems,
    ...groupProblems(groups, data, context, [TOTAL_EXPENDITURE, EXPENDITURE_PER_ADULT]),
  ];
}

/** Goods that are not there, columns of groups, and prices of one's own. */
function figureProblems(specification: FigureSpecification, context: Context): Problem[] {
  const { at, groups, goods: named = [], system: name } = specification;
  const change = context.specifications.get(specification["price change"] ?? "");
  const system = context.specifications.get(change?.kind === "price change" ? change.system : (name ?? ""));
  const owner = system?.kind === "system" ? system.data : (specification.data ?? "");
  const data = context.specifications.get(owner);
  if (data?.kind !== "data") return [];
  const tell = teller(context.places);
  const goods = Object.keys(data.goods);
  const problems = named.flatMap((good, i) =>
    goods.includes(good)
      ? []
      : [
          tell(
            ["goods", i],
            ...noGood(
              owner,
              good,
              goods.filter((other) => !named.includes(other)),
            ),
          ),
        ],
  );
  return [
    ...problems.slice(0, MOST_TOLD),
    ...(at === undefined ? [] : priceProblems(at, name ?? "", context)),
    ...groupProblems(groups, data, context, [TOTAL_EXPENDITURE]),
  ];
}

/** Prices of one's own at which a system is evaluated: a price for each of its goods and no other. */
function priceProblems(at: SlutskySpecification["at"], systemName: string, context: Context): Problem[] {
  if (typeof at === "string" || !("prices" in at)) return [];
  const tell = teller(context.places);
  const system = context.specifications.get(systemName);
  const data = system?.kind === "system" ? context.specifications.get(system.data) : undefined;
  if (system?.kind !== "system" || data?.kind !== "data") return [];
  const goods = Object.keys(data.goods);
  const priced = Object.keys(at.prices);
  const known = new Set(goods);
  const problems: Problem[] = priced
    .filter((good) => !known.has(good))
    .slice(0, MOST_TOLD)
    .map((good) => {
      const [sentence, nearest] = noGood(
        system.data,
        good,
        goods.filter((other) => !priced.includes(other)),
      );
      const place = context.places.key(["at", "prices", good]);
      return { sentence, key: ["at", "prices", good], ...(place && { place }), ...(nearest && { nearest }) };
    });
  const without = goods.filter((good) => !priced.includes(good));
  if (problems.length === 0 && without.length > 0) {
    problems.push(
      tell(
        ["at", "prices"],
        `prices has ${counted(priced.length, "good")}, the system has ${counted(goods.length, "good")}: ${listWords(without)} ${without.length === 1 ? "has" : "have"} no price.`,
      ),
    );
  }
  return problems;
}
