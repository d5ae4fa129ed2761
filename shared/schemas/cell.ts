import { z } from "zod";
import { dataFinding, dataSpecification } from "./data.ts";
import { elasticitiesFinding, elasticitiesSpecification } from "./elasticities.ts";
import { figureFinding, figureSpecification } from "./figure.ts";
import { priceChangeFinding, priceChangeSpecification } from "./price-change.ts";
import { slutskyFinding, slutskySpecification } from "./slutsky.ts";
import { systemFinding, systemSpecification } from "./system.ts";
import { testsFinding, testsSpecification } from "./tests.ts";
import { textFinding, textSpecification } from "./text.ts";

/** The kinds of cell. A kind is added here, with its schema file, its engine file and its view. */
export const CELL_KINDS = [
  "data",
  "system",
  "tests",
  "elasticities",
  "slutsky",
  "price change",
  "figure",
  "text",
] as const;
export const cellKind = z.enum(CELL_KINDS);
export type CellKind = z.infer<typeof cellKind>;

export const cellSpecification = z.discriminatedUnion("kind", [
  dataSpecification,
  systemSpecification,
  testsSpecification,
  elasticitiesSpecification,
  slutskySpecification,
  priceChangeSpecification,
  figureSpecification,
  textSpecification,
]);
export type CellSpecification = z.infer<typeof cellSpecification>;

export const SPECIFICATIONS = {
  data: dataSpecification,
  system: systemSpecification,
  tests: testsSpecification,
  elasticities: elasticitiesSpecification,
  slutsky: slutskySpecification,
  "price change": priceChangeSpecification,
  figure: figureSpecification,
  text: textSpecification,
} as const;

export const finding = z.discriminatedUnion("kind", [
  dataFinding,
  systemFinding,
  testsFinding,
  elasticitiesFinding,
  slutskyFinding,
  priceChangeFinding,
  figureFinding,
  textFinding,
]);
export type Finding = z.infer<typeof finding>;
export type FindingOf<K extends CellKind> = Extract<Finding, { kind: K }>;
export type SpecificationOf<K extends CellKind> = Extract<CellSpecification, { kind: K }>;
