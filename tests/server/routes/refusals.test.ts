import { afterAll, beforeAll, expect, test } from "vitest";
import { insertPerson } from "../../../server/db/queries/people.ts";
import { apiError } from "../../../shared/schemas/resources.ts";
import { type Application, startApplication, type Visitor } from "../../support/application.ts";

type Who = "owner" | "coauthor" | "reader";

/** Every route of a study, what it is asked with, who may, and bodies that will not do. */
interface RouteRow {
  readonly method: string;
  readonly path: string;
  readonly body?: () => unknown;
  readonly may: readonly Who[];
  readonly bad?: readonly unknown[];
}

const ALL: readonly Who[] = ["owner", "coauthor", "reader"];
const WRITERS: readonly Who[] = ["owner", "coauthor"];
const form = () => {
  const body = new FormData();
  body.set("file", new Blob(["p1\n1\n2\n"]), "weeks.csv");
  return body;
};

const ROUTES: readonly RouteRow[] = [
  { method: "GET", path: "", may: ALL },
  { method: "PATCH", path: "", body: () => ({ title: "Levy" }), may: WRITERS, bad: [{ title: "" }, { colour: 1 }, []] },
  { method: "DELETE", path: "", may: ["owner"] },
  { method: "GET", path: "/people", may: ALL },
  {
    method: "POST",
    path: "/invitations",
    body: () => ({ email: "new@vihe.example", role: "reader" }),
    may: ["owner"],
    bad: [{}, { email: "new", role: "reader" }, { email: "new@vihe.example", role: "chief" }],
  },
  {
    method: "PATCH",
    path: "/people/nobody",
    body: () => ({ role: "reader" }),
    may: ["owner"],
    bad: [{}, { role: "chief" }],
  },
  { method: "DELETE", path: "/people/nobody", may: ["owner"] },
  { method: "GET", path: "/uploads", may: ALL },
  { method: "POST", path: "/uploads", body: form, may: WRITERS, bad: [{ file: "no form" }] },
  { method: "DELETE", path: "/uploads/none", may: WRITERS },
  { method: "GET", path: "/status", may: ALL },
  { method: "GET", path: `/findings/${"0".repeat(64)}`, may: ALL },
  { method: "POST", path: "/cells/none/estimation", may: WRITERS },
  { method: "DELETE", path: "/cells/none/estimation", may: WRITERS },
  { method: "POST", path: "/estimations", may: WRITERS },
  { method: "GET", path: "/remarks", may: ALL },
  {
    method: "POST",
    path: "/remarks",
    body: () => ({ cellId: "none", text: "Quote both." }),
    may: ALL,
    bad: [
      {},
      { cellId: "none", text: " \n" },
      { cellId: "none", text: "x".repeat(4001) },
      { cellId: "none", text: "a\u0000b" },
      { cellId: "none", text: "x", anchor: "somewhere" },
      { cellId: "none", text: "x", author: "ilse" },
    ],
  },
  { method: "PATCH", path: "/remarks/none", body: () => ({ text: "Quote both." }), may: ALL, bad: [{}, { text: "" }] },
  {
    method: "PATCH",
    path: "/remarks/none/settled",
    body: () => ({ settled: true }),
    may: ALL,
    bad: [{}, { settled: "yes" }],
  },
  { method: "DELETE", path: "/remarks/none", may: ALL },
  { method: "POST", path: "/remarks/none/replies", body: () => ({ text: "Yes." }), may: ALL, bad: [{}, { text: "" }] },
  {
    method: "PATCH",
    path: "/remarks/none/replies/none",
    body: () => ({ text: "Yes." }),
    may: ALL,
    bad: [{}, { text: "x".repeat(4001) }],
  },
  { method: "DELETE", path: "/remarks/none/replies/none", may: ALL },
  { method: "GET", path: "/referee-copies", may: ["owner"] },
  {
    method: "POST",
    path: "/referee-copies",
    body: () => ({ cellId: "none" }),
    may: ["owner"],
    bad: [{}, { cellId: 1 }],
  },
  { method: "DELETE", path: "/referee-copies/none", may: ["owner"] },
  {
    method: "PATCH",
    path: "/referee-copies/none",
    body: () => ({ expiresAt: null }),
    may: ["owner"],
    bad: [{}, { expiresAt: "soon" }],
  },
  {
    method: "POST",
    path: "/referee-copies/none/link",
    body: () => ({}),
    may: ["owner"],
    bad: [{ email: "nobody" }],
  },
  { method: "GET", path: "/invitations", may: ["owner"] },
  { method: "GET", path: "/history", may: ALL },
  { method: "GET", path: "/checkpoints", may: ALL },
  { method: "GET", path: "/journal", may: ALL },
];

let application: Application;
let people: Record<Who | "outsider", Visitor>;
let study: string;

beforeAll(async () => {
  application = await startApplication();
  const [owner, coauthor, reader, outsider] = await Promise.all(
    ["Ilse Marchetti", "Tomas Adeyemi", "Petra Vance", "Outi Sider"].map(application.person),
  );
  people = { owner, coauthor, reader, outsider };
  const made = await owner.ask("POST", "/api/studies", { title: "Levy on sweet drinks" });
  study = `/api/studies/${made.body.id}`;
  for (const role of ["coauthor", "reader"] as const) {
    insertPerson(application.open.db, made.body.id, people[role].id, role, new Date());
  }
});
afterAll(() => application.close());

const named = ROUTES.map((route) => [`${route.method} /api/studies/:studyId${route.path}`, route] as const);

test.each(named)("%s", async (_name, { method, path, body, may, bad = [] }) => {
  const ask = (who: Visitor, what: unknown = body?.(), to = study) => who.ask(method, `${to}${path}`, what);

  const answers = [await ask(application.stranger)];
  expect(answers[0].status, "signed out").toBe(401);
  for (const wrong of bad) {
    expect((await ask(application.stranger, wrong)).status, "signed out, whatever the body").toBe(401);
    const answer = await ask(people.owner, wrong);
    expect(answer.status, JSON.stringify(wrong)).toBe(400);
    answers.push(answer);
  }
  const outside = await ask(people.outsider);
  const nowhere = await ask(people.outsider, body?.(), "/api/studies/none");
  expect([outside.status, nowhere.status], "not one of its people").toEqual([404, 404]);
  expect(outside.body, "a foreign study and none at all").toEqual(nowhere.body);
  for (const who of ALL.filter((role) => !may.includes(role))) {
    const answer = await ask(people[who]);
    expect(answer.status, who).toBe(403);
    answers.push(answer);
  }
  for (const answer of [...answers, outside]) expect(apiError.safeParse(answer.body).success).toBe(true);
  for (const who of may.filter((role) => role !== "owner")) {
    expect([200, 201, 202, 204, 404], who).toContain((await ask(people[who])).status);
  }
});

test("GET and POST /api/studies need someone signed in, and a title", async () => {
  expect((await application.stranger.ask("GET", "/api/studies")).status).toBe(401);
  expect((await application.stranger.ask("POST", "/api/studies", { title: "x" })).status).toBe(401);
  for (const bad of [{}, { title: " " }, { title: "x".repeat(201) }, { title: "x", extra: true }]) {
    expect((await people.owner.ask("POST", "/api/studies", bad)).status).toBe(400);
  }
});

test("GET /api/me needs someone signed in; GET /api/installation does not", async () => {
  expect((await application.stranger.ask("GET", "/api/me")).status).toBe(401);
  const door = await application.stranger.ask("GET", "/api/installation");
  expect([door.status, door.body]).toEqual([200, { name: "Tangency", version: "test", demo: [] }]);
});

test("a finding is asked for by a fingerprint", async () => {
  expect((await people.owner.ask("GET", `${study}/findings/abc`)).status).toBe(400);
});

test("changes asked for by another site's page are refused, whoever is signed in", async () => {
  const headers = { origin: "https://elsewhere.example" };
  const answer = await people.owner.ask("POST", "/api/studies", { title: "x" }, headers);
  expect([answer.status, answer.body.error.code]).toEqual([403, "foreign origin"]);
  const upload = await people.owner.ask("POST", `${study}/uploads`, form(), headers);
  expect(upload.status).toBe(403);
});

test("a body that is no JSON, too long a one, and no route", async () => {
  const long = await people.owner.ask("POST", "/api/studies", { title: "x".repeat(300_000) });
  expect([long.status, long.body.error.sentence]).toEqual([
    413,
    expect.stringMatching(/30\d{4} bytes; at most 262144/),
  ]);
  const response = await fetch(`${application.origin}/api/studies`, {
    method: "POST",
    headers: { "content-type": "application/json", origin: application.origin },
    body: "{",
  });
  expect([response.status, (await response.json()).error.sentence]).toEqual([400, "The request's body is not JSON."]);
  expect((await people.owner.ask("GET", "/api/nothing")).status).toBe(404);
});
