import { QueryClient, QueryClientProvider } from "@tanstack/react-query";
import { render, screen, within } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import type { RefereeCopy, SealedContent } from "../../shared/schemas/referee-copy.ts";
import type { SealedText } from "../../shared/schemas/text.ts";
import { canonicalJson } from "../../shared/study/canonical-json.ts";
import { sha256Hex } from "../../shared/study/fingerprint.ts";
import { parseStudyFile } from "../../shared/study/study-file.ts";
import { RefereePage } from "../../src/app/pages/referee.tsx";
import { sealTangents } from "../../src/features/referee-copy/seal.tsx";
import { specificationYaml } from "../../src/features/referee-copy/sealed-files.ts";
import { verifyCopy } from "../../src/workers/verify-copy.ts";
import { exampleFindings } from "../support/findings.ts";
import { sampleElasticities } from "../support/sample-elasticities.ts";
import { sampleContent, sampleCopy } from "../support/sample-findings.ts";

const copy = sampleCopy();

function answerWith(status: number, body: unknown) {
  const fetched = vi.fn(async () => new Response(JSON.stringify(body), { status }));
  vi.stubGlobal("fetch", fetched);
  return fetched;
}

/** The page with its computation on this thread: jsdom has no workers. */
function open(answered: RefereeCopy | undefined, status = 200) {
  const refused = { error: { code: "not found", sentence: "There is nothing here.", problems: [] } };
  const fetched = answerWith(status, answered ?? refused);
  const client = new QueryClient({ defaultOptions: { queries: { retry: false } } });
  render(
    <QueryClientProvider client={client}>
      <RefereePage token="a token/with a slash" verify={async (one) => verifyCopy(one, () => performance.now())} />
    </QueryClientProvider>,
  );
  return { fetched, user: userEvent.setup() };
}

/** The same copy with one coefficient changed in what everything is computed from. */
function altered(seal: (content: SealedContent) => string): RefereeCopy {
  const content = structuredClone(sampleContent());
  content.slutsky.fitted.theta[3] += 0.001;
  return { fingerprint: seal(content), content };
}

const saved: { name: string; text: Promise<string> }[] = [];
beforeEach(() => {
  saved.length = 0;
  const texts = new Map<string, Blob>();
  vi.spyOn(HTMLAnchorElement.prototype, "click").mockImplementation(function (this: HTMLAnchorElement) {
    saved.push({ name: this.download, text: readBlob(texts.get(this.href)!) });
  });
  URL.createObjectURL = (blob) => {
    const address = `blob:here/${texts.size}`;
    texts.set(address, blob as Blob);
    return address;
  };
  URL.revokeObjectURL = () => undefined;
});
afterEach(() => {
  vi.unstubAllGlobals();
  vi.restoreAllMocks();
});

const readBlob = (blob: Blob) =>
  new Promise<string>((resolve) => {
    const reader = new FileReader();
    reader.onload = () => resolve(String(reader.result));
    reader.readAsText(blob);
  });

const ARGUMENT: SealedText = {
  kind: "text",
  markdown: "## Meat\n\nA *luxury*, 1.318 (0.009).\n\n#### By season\n\nThe same.",
  numbers: [
    {
      from: 21,
      to: 34,
      cell: "base",
      words: ["eta", "meat & fish"],
      printed: "1.318 (0.009)",
      says: "expenditure elasticity of meat & fish at the base point",
      fingerprint: "ab12".repeat(16),
    },
  ],
};

/** A copy with further findings of every kind that can be sealed; the second matrix and system are the first once more. */
function sealedWithMore(): RefereeCopy {
  const content = structuredClone(sampleContent());
  const { slutsky, system } = content;
  content.also = [
    { kind: "slutsky", name: "again", finding: structuredClone(slutsky) },
    { kind: "system", name: "rival", finding: structuredClone(system) },
    { kind: "elasticities", name: "thirds", finding: sampleElasticities(3) },
    { kind: "elasticities", name: "at the mean", finding: sampleElasticities(1) },
    { kind: "tests", name: "laws", finding: exampleFindings().tests },
    { kind: "text", name: "argument", finding: ARGUMENT },
  ];
  content.methods = [
    { system: "base", text: "Shares follow…", references: ["Stone, R. (1954)."], bibtex: "@article{s}" },
  ];
  return sampleCopy(content);
}

describe("further findings", () => {
  it("stand below the matrix under their names, each heading for itself, and are computed again where they can be", async () => {
    open(sealedWithMore());
    expect(await screen.findByText("Recomputed in this browser")).toBeInTheDocument();
    await screen.findByText(/^Sealed with the matrix\./, {}, { timeout: 30_000 });
    const headings = [...document.querySelectorAll("main > section > h2")].map(({ textContent }) => textContent);
    expect(headings).toEqual(
      expect.arrayContaining([
        "again slutsky",
        "rival system",
        "thirds elasticities",
        "at the mean elasticities",
        "laws tests",
        "argument text",
        "base methods",
      ]),
    );
    expect(screen.getByRole("row", { name: /^again matrix, errors, eigenvalues, checks 0/ })).toBeInTheDocument();
    expect(screen.getByRole("row", { name: /^rival coefficients as tabled 0/ })).toBeInTheDocument();
    // Each view is loaded when it is first shown.
    await vi.waitFor(
      () => expect(document.body.textContent).not.toMatch(/Opening (again|rival|thirds|at the|laws|argument)/),
      30_000,
    );
    const ids = [...document.querySelectorAll("[id]")].map(({ id }) => id);
    expect(ids.filter((id, place) => ids.indexOf(id) !== place)).toEqual([]);
  }, 60_000);

  it("of words have their numbers in their places, said to be as sealed, and heads below the text's name", async () => {
    const { user } = open(sealedWithMore());
    const text = await screen.findByRole("region", { name: "argument text" });
    expect(await within(text).findByText("1.318 (0.009)", { selector: ".quoted" })).toHaveAttribute(
      "title",
      "expenditure elasticity of meat & fish at the base point, from base",
    );
    expect(text).toHaveTextContent("1 quoted number, as it was when this was sealed.");
    expect(
      within(text).getByRole("row", {
        name: "base: eta, meat & fish 1.318 (0.009) expenditure elasticity of meat & fish at the base point ab12 ab12 ab12 ab12",
      }),
    ).toBeInTheDocument();
    expect(within(text).getByRole("heading", { level: 3 })).toHaveTextContent("Meat");
    expect(within(text).getByRole("heading", { level: 4 })).toHaveTextContent("By season");
    expect(document.querySelector(".katex")).toBeNull();

    const methods = screen.getByRole("region", { name: "base methods" });
    expect(within(methods).getByRole("listitem")).toHaveTextContent("Stone, R. (1954).");
    for (const name of ["argument, text", "Methods of base", "References of the methods of base", "Tables"])
      await user.click(screen.getByRole("button", { name }));
    expect(saved.map(({ name }) => name.replace(/^referee-copy-\w+/, ""))).toEqual([
      "-also-6-text.md",
      "-methods-1.txt",
      "-methods-1.bib",
      ".tex",
    ]);
    expect(await saved[0].text).toBe(ARGUMENT.markdown);
    expect(await saved[1].text).toContain("References\n\nStone, R. (1954).");
    expect(await saved[3].text).toContain("1.318 (0.009)");
  }, 60_000);

  it.each([
    "One line.",
    "  Set in.\n\n## Meat\n\n- one\n- two\n",
    "Ends with lines.\n\n\n",
    'Tab\there, "quotes": {base: rows}\u2028\n---\n# no comment',
  ])("of words keep every letter in the study file: %j", async (text) => {
    const content = structuredClone(sampleContent());
    content.cells.sources = [...content.cells.sources, { name: "argument", kind: "text", source: text }];
    const study = parseStudyFile(specificationYaml(content));
    expect(study.cells.find(({ name }) => name === "argument")?.source).toBe(text);
    expect(study.cells.map(({ name }) => name)).toEqual(["survey", "base", "matrix", "argument"]);
  });

  it("are found out when changed after sealing", async () => {
    const changed = sealedWithMore();
    const [again, rival] = changed.content.also ?? [];
    if (again?.kind !== "slutsky" || rival?.kind !== "system") throw new Error("the copy has other findings");
    again.finding.at.share[0][1] += 0.002;
    rival.finding.coefficients[0].estimate += 0.003;
    open(changed);
    expect(await screen.findByText("Recomputed in this browser, and it does not agree")).toBeInTheDocument();
    expect(screen.getByRole("row", { name: /^again / })).toHaveTextContent("differs, 0.0020");
    expect(screen.getByRole("row", { name: /^rival / })).toHaveTextContent("differs, 0.0030");
  });

  it("are taken away as tables like the rest", async () => {
    const { user } = open(sealedWithMore());
    await user.click(await screen.findByRole("button", { name: "thirds, elasticities" }));
    await user.click(screen.getByRole("button", { name: "Tables" }));
    expect(saved[0].name).toMatch(/-also-3-elasticities\.csv$/);
    expect(await saved[0].text).toContain("lowest third");
    expect(await saved[1].text).toContain("highest third");
  });
});

describe("a copy that has been replaced", () => {
  it("says so and stays; the newer one is one press away", async () => {
    const newer = { sealedAt: "2032-04-01T08:00:00.000Z", fingerprint: "f".repeat(64) };
    const { fetched, user } = open({ ...copy, newer });
    const notice = await screen.findByRole("complementary", { name: "A newer copy" });
    expect(notice).toHaveTextContent("on 1 April 2032 at 8:00. This one stays as it was sealed.");
    await user.click(within(notice).getByRole("button", { name: "Read the newer copy" }));
    expect(fetched.mock.lastCall?.[0 as never]).toBe("/api/referee/a%20token%2Fwith%20a%20slash/newest");
  });
});

describe("the referee's page", () => {
  it("asks for the copy alone, by its token, and needs no account", async () => {
    const { fetched } = open(copy);
    await screen.findByRole("heading", { level: 1, name: "Food demand in Velmark, 2029–31" });
    expect(fetched).toHaveBeenCalledTimes(1);
    expect(fetched.mock.calls[0]).toEqual([
      "/api/referee/a%20token%2Fwith%20a%20slash",
      expect.objectContaining({ method: "GET" }),
    ]);
    expect(screen.getByText(/Authors withheld for review/)).toBeInTheDocument();
  });

  it("recomputes on load and says that everything agrees, part by part", async () => {
    open(copy);
    expect(await screen.findByText("Recomputed in this browser")).toBeInTheDocument();
    expect(screen.getByRole("heading", { name: "Largest difference 0" })).toBeInTheDocument();
    const table = screen.getByRole("table", { name: "" });
    expect(within(table).getByRole("row", { name: /^Matrix 36 entries 0/ })).toBeInTheDocument();
    expect(within(table).getByRole("row", { name: /^Eigenvalues 5, and the null direction 0/ })).toBeInTheDocument();
    expect(within(table).getByRole("row", { name: /^Verdicts five laws at the point agree/ })).toBeInTheDocument();
    expect(screen.getByText("Computed again from what this page received: the same.")).toBeInTheDocument();
  });

  it("says what does not agree when one coefficient was altered after sealing", async () => {
    open(altered(() => copy.fingerprint));
    expect(await screen.findByText("Recomputed in this browser, and it does not agree")).toBeInTheDocument();
    expect(screen.getByRole("heading", { name: "Largest difference 0.0011" })).toBeInTheDocument();
    expect(screen.getByText(/What this page received has another/)).toBeInTheDocument();
    expect(screen.getByRole("row", { name: /^Coefficients as tabled/ })).toHaveTextContent("0.0010");
  });

  it("says so even when the altered copy was given a fingerprint of its own", async () => {
    open(altered((content) => sha256Hex(canonicalJson(content))));
    expect(await screen.findByText("Recomputed in this browser, and it does not agree")).toBeInTheDocument();
    expect(screen.getByText("Computed again from what this page received: the same.")).toBeInTheDocument();
  });

  it("recomputes again when asked", async () => {
    const { user } = open(copy);
    await screen.findByText("Recomputed in this browser");
    await user.click(screen.getByRole("button", { name: "Recompute" }));
    expect(await screen.findByText("Recomputed in this browser")).toBeInTheDocument();
  });

  it("shows verdicts, matrix, eigenvalues, specification and row accounting", async () => {
    const { user } = open(copy);
    await screen.findByText("Recomputed in this browser");
    const laws = within(screen.getByRole("list", { name: /theory/ })).getAllByRole("listitem");
    const words = [
      "Adding-up holds",
      "Homogeneity imposed",
      "Symmetry imposed",
      "Negativity at base point",
      "Monotonicity",
    ];
    words.forEach((word, index) => {
      expect(laws[index]).toHaveTextContent(new RegExp(`^${word.replace(" ", "")}`));
    });
    expect(screen.getByRole("grid", { name: /Slutsky matrix, share form, at the base point/ })).toBeInTheDocument();
    expect(screen.getByText("Almost ideal demand system, 6 goods")).toBeInTheDocument();
    expect(screen.getByRole("row", { name: "Rows used 900" })).toBeInTheDocument();
    await user.click(screen.getByRole("button", { name: "As text" }));
    expect(screen.getByText(/impose: \[homogeneity, symmetry\]/)).toBeInTheDocument();
    await user.click(screen.getByRole("button", { name: "Coefficients, 60 of them" }));
    expect(screen.getByRole("group", { name: "Coefficients of the share equations" })).toBeInTheDocument();
  });

  it("makes its downloads from the sealed content", async () => {
    const { user } = open(copy);
    await screen.findByText("Recomputed in this browser");
    for (const name of [
      "Matrix, with standard errors",
      "Coefficients, with full covariance",
      "Tables",
      "Specification",
    ])
      await user.click(screen.getByRole("button", { name }));
    await user.click(screen.getByRole("button", { name: "Everything sealed" }));
    const stem = `referee-copy-${copy.fingerprint.slice(0, 8)}`;
    expect(saved.map(({ name }) => name)).toEqual([
      `${stem}-matrix.csv`,
      `${stem}-coefficients.csv`,
      `${stem}.tex`,
      `${stem}.yaml`,
      `${stem}.json`,
    ]);
    expect(sha256Hex(await saved[4].text)).toBe(copy.fingerprint);
    const study = parseStudyFile(await saved[3].text);
    expect(study.title).toBe("Food demand in Velmark, 2029–31");
    expect(study.problems).toEqual([]);
    expect(study.cells.map(({ name, parsed }) => [name, parsed.kind])).toEqual([
      ["survey", "data"],
      ["base", "system"],
      ["matrix", "slutsky"],
    ]);
  });

  it("gives one plain page for a link that opens nothing, with no hint of why", async () => {
    open(undefined, 404);
    expect(await screen.findByRole("heading", { name: "This link opens nothing" })).toBeInTheDocument();
    expect(document.body).not.toHaveTextContent(/revoke|expire|exist|There is nothing here/);
  });
});

describe("the seal", () => {
  it("has sixteen tangents, each touching the circle where its byte says", () => {
    const tangents = sealTangents(copy.fingerprint);
    expect(tangents).toHaveLength(16);
    for (const { dot, from, to } of tangents) {
      expect(Math.hypot(dot[0] - 60, dot[1] - 60)).toBeCloseTo(25, 10);
      const along = [to[0] - from[0], to[1] - from[1]];
      expect(along[0] * (dot[0] - 60) + along[1] * (dot[1] - 60)).toBeCloseTo(0, 9);
      expect(Math.hypot(...along)).toBeGreaterThanOrEqual(16 - 1e-9);
    }
  });

  it("is another figure when one digit changes", () => {
    const other = `${copy.fingerprint[0] === "0" ? "1" : "0"}${copy.fingerprint.slice(1)}`;
    expect(sealTangents(other)[0]).not.toEqual(sealTangents(copy.fingerprint)[0]);
    expect(sealTangents(other).slice(1)).toEqual(sealTangents(copy.fingerprint).slice(1));
  });
});
