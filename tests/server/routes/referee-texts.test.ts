import { afterAll, beforeAll, describe, expect, test } from "vitest";
import type { CellKind, Finding } from "../../../shared/schemas/cell.ts";
import { refereeCopy } from "../../../shared/schemas/referee-copy.ts";
import type { TextFinding } from "../../../shared/schemas/text.ts";
import { type Application, startApplication, type Visitor } from "../../support/application.ts";
import { exampleFindings } from "../../support/findings.ts";
import { sampleElasticities } from "../../support/sample-elasticities.ts";
import { sampleData, sampleSlutsky, sampleSystem } from "../../support/sample-findings.ts";

const SYSTEM = "data: survey\nform: aids\nimpose: [homogeneity, symmetry]\nestimator: maximum likelihood";
/** What is stored of a text is nothing; that there is something makes the fake's cell current. */
const WRITTEN: TextFinding = { kind: "text", text: "", quotations: [], resolved: "" };

let application: Application;
let owner: Visitor;
let studyId: string;
let matrixId: string;

const put = (name: string, kind: CellKind, source: string, reads: string[], finding: Finding, state = "current") =>
  application.cells.put(studyId, { name, kind, source }, reads, finding, state);
const write = (name: string, text: string, reads: string[] = [], state = "current") =>
  put(name, "text", text, reads, WRITTEN, state).cellId;
const seal = (more: Record<string, unknown> = {}) =>
  owner.ask("POST", `/api/studies/${studyId}/referee-copies`, { cellId: matrixId, ...more });
const open = async (token: string) =>
  refereeCopy.parse((await application.stranger.ask("GET", `/api/referee/${token}`)).body);
const refusal = async (cellId: string, more = {}) => {
  const { status, body } = await seal({ also: [cellId], ...more });
  return [status, body.error?.sentence];
};

beforeAll(async () => {
  application = await startApplication();
  owner = await application.person("Ilse Marchetti");
  studyId = (await owner.ask("POST", "/api/studies", { title: "Levy on sweet drinks" })).body.id;
  put("survey", "data", "upload: marchetti.csv", [], sampleData());
  put("base", "system", SYSTEM, ["survey"], sampleSystem());
  matrixId = put("matrix", "slutsky", "system: base\nat: base point", ["base"], sampleSlutsky()).cellId;
});
afterAll(() => application.close());

describe("a text sealed with the matrix", () => {
  test("has its numbers as they were, each with what it is and the finding it came from", async () => {
    const id = write("argument", "## Meat\n\nA *luxury*, {base: eta, meat & fish}, in {survey: rows used} rows.", [
      "base",
      "survey",
    ]);
    const sealed = await seal({ also: [id] });
    expect(sealed.status).toBe(201);
    const { content } = await open(sealed.body.token);
    const [text] = content.also ?? [];
    if (text?.kind !== "text") throw new Error("no text was sealed");
    const [luxury, rows] = text.finding.numbers;
    expect(text.finding.markdown).toBe(`## Meat\n\nA *luxury*, ${luxury.printed}, in ${rows.printed} rows.`);
    expect(luxury.printed).toMatch(/^1\.318 \(0\.\d+\)$/);
    expect(luxury.says).toBe("expenditure elasticity of meat & fish at the base point");
    const base = application.cells.status(studyId).cells.find(({ name }) => name === "base");
    expect(luxury.fingerprint).toBe(base?.fingerprint);
    expect(content.cells.sources.find(({ kind }) => kind === "text")?.source).toContain("{base: eta, meat & fish}");
  });

  test("stays as it was when what it quotes is found anew", async () => {
    const system = sampleSystem();
    const { cellId } = put("rival", "system", SYSTEM, ["survey"], system);
    const id = write("of rival", "Over {rival: rows} rows.", ["rival"]);
    const { token } = (await seal({ also: [id] })).body;
    const before = await open(token);
    system.rows = 12;
    expect((await open((await seal({ also: [cellId, id] })).body.token)).content.also?.[1].finding).toMatchObject({
      markdown: "Over 12 rows.",
    });
    expect(await open(token)).toEqual(before);
    expect(before.content.also?.[0].finding).toMatchObject({ markdown: "Over 900 rows." });
  });

  test("brings the sources of all it quotes, the file of its data withheld with the authors", async () => {
    put("other survey", "data", "upload: marchetti-b.csv", [], exampleFindings().data);
    const id = write("of another", "{other survey: rows used} households.", ["other survey"]);
    const { content } = await open((await seal({ also: [id] })).body.token);
    expect(content.cells.sources.map(({ name }) => name).sort()).toEqual(
      ["base", "matrix", "of another", "other survey", "survey"].sort(),
    );
    expect(JSON.stringify(content)).not.toMatch(/marchetti/i);
  });

  test("is refused while it is not current, and when a number of it is not there", async () => {
    expect(await refusal(write("behind", "{base: rows}", ["base"], "out of date"))).toEqual([
      409,
      "behind is out of date, and only a current text is sealed.",
    ]);
    const [status, sentence] = await refusal(write("gone", "{base: rows} and {base: eta, bread}", ["base"]));
    expect(status).toBe(409);
    expect(sentence).toMatch(/^In gone 1 of 2 quoted numbers is not there: base: eta, bread has no number \(.*\)\./);
    expect(sentence).toMatch(/Only a text whose every number is current is sealed\.$/);
  });

  test("is refused when what it quotes would show a household or a few", async () => {
    put("one household", "slutsky", "system: base\nat: {row: 12}", ["base"], {
      ...sampleSlutsky(),
      pointName: "row 12",
    });
    const [at, row] = await refusal(write("of a row", "{one household: largest eigenvalue}", ["one household"]));
    expect([at, row]).toEqual([409, expect.stringMatching(/^of a row quotes one household\. .* row 12, .*household/)]);
    const small = sampleElasticities(3);
    small.groups[1].rows = 9;
    put("thirds", "elasticities", "system: base\ngroups: {of: total expenditure, quantiles: 3}", ["base"], small);
    const { name } = small.groups[0];
    const [status, group] = await refusal(write("of thirds", `{thirds: rows, ${name}}`, ["thirds"]));
    expect([status, group]).toEqual([
      409,
      expect.stringMatching(/^of thirds quotes thirds\. thirds has a group of 9 rows/),
    ]);
  });

  test.each([
    ["at one household's row", "at: {row: 12}", { pointName: "row 12" }, /levy stands at row 12, .* of one household/],
    [
      "borne by a group of a few",
      "at: mean",
      { pointName: "mean", incidence: { groups: [{ name: "urban", rows: 9 }], without: [] } },
      /levy has a group of 9 rows \(urban\)/,
    ],
  ])("is refused when it quotes a price change %s", async (how, at, found, sentence) => {
    // As much of a finding as is looked at before it is refused.
    const finding = { kind: "price change", ...found } as unknown as Finding;
    const name = `${how.split(" ")[0]} levy`;
    put(name, "price change", `system: base\n${at}\nprices: {dairy: {per cent: 10}}`, ["base"], finding);
    const [status, told] = await refusal(write(`of ${name}`, `{${name}: cv}`, [name]));
    expect([status, told]).toEqual([409, expect.stringMatching(sentence)]);
  });

  test.each([
    [
      "by name",
      "As ilse  MARCHETTI argues.",
      "signed by name names Ilse Marchetti, and the authors' names are withheld",
    ],
    ["by address", "Write to ilse.marchetti@vihe.example.", "signed by address names ilse.marchetti@vihe.example"],
    ["by a file", "From marchetti.csv.", "signed by a file names marchetti.csv, and names of files are withheld"],
  ])("is refused when it names an author %s and the names are withheld", async (how, text, sentence) => {
    const id = write(`signed ${how}`, text);
    const [status, told] = await refusal(id);
    expect([status, told]).toEqual([409, expect.stringContaining(sentence)]);
    expect((await seal({ also: [id], withholdAuthors: false })).status).toBe(201);
    expect((await seal({ also: [write(`unsigned ${how}`, "As Marchettis argue.")] })).status).toBe(201);
  });

  test("an author's name is found in the note and in comments of sources as well", async () => {
    expect((await seal({ note: "By Ilse Marchetti" })).body.error.sentence).toContain("The note names Ilse Marchetti");
    put("signed", "system", `# asked by Ilse Marchetti\n${SYSTEM}`, ["survey"], sampleSystem());
    const signed = put("of signed", "slutsky", "system: signed\nat: base point", ["signed"], sampleSlutsky());
    expect((await seal({ cellId: signed.cellId })).body.error.sentence).toContain("signed names Ilse Marchetti");
  });
});

describe("the methods of the sealed systems", () => {
  test("go with them where that is asked for, once a system, with the works they cite", async () => {
    const rival = put("needs", "system", SYSTEM.replace("aids", "les"), ["survey"], sampleSystem()).cellId;
    const base = application.cells.status(studyId).cells.find(({ name }) => name === "base")?.cellId;
    expect((await open((await seal()).body.token)).content).not.toHaveProperty("methods");
    const { content } = await open((await seal({ methods: true, also: [base, rival] })).body.token);
    expect(content.methods?.map(({ system }) => system)).toEqual(["base", "needs"]);
    const [methods] = content.methods ?? [];
    expect(methods.text).toContain("almost ideal");
    expect(methods.text).toContain("900");
    expect(methods.references.join("\n")).toContain("Deaton");
    expect(methods.bibtex.match(/^@/gm)).toHaveLength(methods.references.length);
  });
});
