import { act, screen, waitFor, within } from "@testing-library/react";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import type { Remark } from "../../../shared/schemas/remarks.ts";
import { AnchorMark } from "../../../src/components/anchor-mark.tsx";
import { forgetDrafts } from "../../../src/features/remarks/drafts.ts";
import { anchorInWords, letterAt, lettersOf } from "../../../src/features/remarks/letters.ts";
import { partsOf } from "../../../src/features/remarks/links.ts";
import { newsIn } from "../../../src/features/remarks/news.ts";
import type { RemarkSetting } from "../../../src/features/remarks/remark-setting.ts";
import { Remarked } from "../../../src/features/remarks/remarked.tsx";
import RemarksDialog from "../../../src/features/remarks/remarks-dialog.tsx";
import { type Asked, answering, Refused, renderPart } from "../answering.tsx";

beforeEach(() => sessionStorage.clear());
afterEach(() => vi.unstubAllGlobals());

const ilse = { id: "i", name: "Ilse Marchetti" };
const tomas = { id: "t", name: "Tomás Adeyemi" };
const cell = { id: "b", name: "base", kind: "system", source: "data: survey\nform: aids\n# a note: no key\n" };
const at = "2031-03-12T13:52:00.000Z";
const MINE = { edit: true, withdraw: true };
const THEIRS = { edit: false, withdraw: false };

const remark = (id: string, more: Partial<Remark> = {}): Remark => ({
  id,
  cellId: "b",
  cellName: "base",
  cellIsThere: true,
  author: tomas,
  text: `Words of ${id}.`,
  writtenAt: at,
  may: { ...THEIRS, settle: true },
  replies: [],
  ...more,
});
const onSymmetry = remark("r1", {
  anchor: "verdict Symmetry",
  replies: [{ id: "p1", author: ilse, text: "Agreed.", writtenAt: at, may: MINE }],
});

/** Remarks as the server has them; what is asked changes them. */
function show(start: readonly Remark[], { isAlone = false, refuse }: { isAlone?: boolean; refuse?: string } = {}) {
  let remarks = [...start];
  const changing = (change: (asked: Asked) => void) => (asked: Asked) => {
    if (refuse) return new Refused(409, refuse);
    change(asked);
    return remarks[0];
  };
  const asked = answering({
    "GET /api/studies/s/remarks": () => remarks,
    "POST /api/studies/s/remarks": changing(({ body }) => {
      remarks = [...remarks, remark("new", { ...(body as object), author: ilse, may: { ...MINE, settle: true } })];
    }),
    "POST /api/studies/s/remarks/r1/replies": (one: Asked) => {
      if (refuse) return new Refused(409, refuse);
      const reply = { id: "p2", author: ilse, writtenAt: at, may: MINE, text: (one.body as { text: string }).text };
      remarks = remarks.map((had) => (had.id === "r1" ? { ...had, replies: [...had.replies, reply] } : had));
      return reply;
    },
    "PATCH /api/studies/s/remarks/r1/settled": changing(({ body }) => {
      const { settled } = body as { settled: boolean };
      remarks = remarks.map((had) => ({ ...had, settled: settled ? { by: ilse, at } : undefined }));
    }),
    "DELETE /api/studies/s/remarks/r1/replies/p1": () => {
      remarks = remarks.map((had) => ({ ...had, replies: [] }));
    },
  });
  const setting: RemarkSetting = { studyId: "s", me: ilse, isAlone, colourOf: () => undefined };
  const view = renderPart(
    <section>
      <Remarked setting={setting} cell={cell}>
        <p className="recto">
          test p 0.053
          <AnchorMark of="verdict Symmetry" />
          <AnchorMark of="entry Grains, Dairy" />
        </p>
      </Remarked>
    </section>,
  );
  const list = () => screen.findByRole("region", { name: "Remarks on base" });
  return { ...view, asked, list, setting };
}

describe("remarks on a cell", () => {
  it("stand beside it with author, words and replies, and a letter in both places", async () => {
    const { list } = show([onSymmetry, remark("r2")]);
    const letter = await screen.findByRole("link", { name: "Remark a by Tomás Adeyemi, on Symmetry" });
    expect(letter).toHaveTextContent("a");
    const [first, second] = within(await list())
      .getAllByRole("listitem")
      .filter((one) => one.dataset.remark);
    expect(first).toHaveTextContent(/Tomás.*Words of r1\..*Ilse.*Agreed\./);
    expect(second).toHaveTextContent("Words of r2.");
    expect(within(second).queryByRole("link")).not.toBeInTheDocument();
    act(() => letter.click());
    await waitFor(() => expect(first).toHaveFocus());
  });

  it("are added on what they speak of, and the focus comes back", async () => {
    const { user, asked, list } = show([]);
    const aside = await list();
    await user.click(within(aside).getAllByRole("button", { name: "Add a remark on base" })[0]);
    const field = await within(aside).findByRole("textbox", { name: "Remark on base" });
    expect(field).toHaveFocus();
    const about = within(aside).getByRole("combobox", { name: "About" });
    const places = within(about).getAllByRole("option");
    expect(places.map((one) => (one as HTMLOptionElement).value)).toEqual([
      "",
      "verdict Symmetry",
      "entry Grains, Dairy",
      "key data",
      "key form",
    ]);
    await user.type(field, "Only just.");
    await user.selectOptions(about, "Symmetry");
    await user.keyboard("{Control>}{Enter}{/Control}");
    expect(await within(aside).findByText("Only just.")).toBeInTheDocument();
    expect(asked.filter(({ method }) => method === "POST").map(({ body }) => body)).toEqual([
      { cellId: "b", text: "Only just.", anchor: "verdict Symmetry" },
    ]);
    await waitFor(() => expect(within(aside).queryByRole("textbox")).not.toBeInTheDocument());
    await waitFor(() => expect(document.activeElement).toHaveTextContent("Add a remark on base"));
  });

  it("keep what was written when the field is put away, and when it could not be sent", async () => {
    const { user, list, unmount } = show([onSymmetry], { refuse: "This remark is settled; open it again." });
    const reply = async () => user.click(await screen.findByRole("button", { name: /^Reply to the remark/ }));
    await reply();
    await user.type(await screen.findByRole("textbox", { name: "Reply to Tomás Adeyemi" }), "One more thing");
    await user.keyboard("{Escape}");
    expect(await screen.findByRole("button", { name: /^Reply to the remark/ })).toHaveFocus();
    await reply();
    expect(screen.getByRole("textbox")).toHaveValue("One more thing");
    await user.click(screen.getByRole("button", { name: "Reply" }));
    expect(await screen.findByRole("alert")).toHaveTextContent(
      "Not sent, and your words are kept here. This remark is settled; open it again.",
    );
    expect(screen.getByRole("textbox")).toHaveValue("One more thing");
    unmount();
    expect(list).toBeDefined();
    expect(Object.keys(sessionStorage)).toEqual(["tangency-remark/i/s/reply/r1"]);
    forgetDrafts("i");
    expect(sessionStorage).toHaveLength(0);
  });

  it("are not sent without a connection, and say so", async () => {
    const { user, asked } = show([onSymmetry], { isAlone: true });
    await user.click(await screen.findByRole("button", { name: /^Reply to the remark/ }));
    await user.type(await screen.findByRole("textbox"), "Later");
    await user.click(screen.getByRole("button", { name: "Reply" }));
    expect(await screen.findByRole("alert")).toHaveTextContent("Not sent: there is no connection.");
    await user.keyboard("{Escape}");
    await user.click(screen.getByRole("button", { name: /^Settle/ }));
    expect(await screen.findByRole("alert")).toHaveTextContent("Not done: there is no connection.");
    expect(asked.every(({ method }) => method === "GET")).toBe(true);
  });

  it("fold into a line when settled, and open again", async () => {
    const { user, list } = show([onSymmetry]);
    await user.click(await screen.findByRole("button", { name: /^Settle/ }));
    const fold = await screen.findByRole("button", { name: "1 settled remark" });
    expect(screen.queryByText("Words of r1.")).not.toBeInTheDocument();
    expect(screen.queryByRole("link", { name: /on Symmetry/ })).not.toBeInTheDocument();
    await user.click(fold);
    expect(within(await list()).getByText(/^Settled by Ilse Marchetti/)).toBeInTheDocument();
    await user.click(screen.getByRole("button", { name: /^Open again/ }));
    expect(await screen.findByRole("button", { name: /^Settle/ })).toBeInTheDocument();
  });

  it("are withdrawn after one more question only", async () => {
    const { user, asked } = show([onSymmetry]);
    await user.click(await screen.findByRole("button", { name: "Edit the reply by Ilse Marchetti" }));
    await user.click(screen.getByRole("button", { name: "Withdraw the reply by Ilse Marchetti" }));
    expect(asked.some(({ method }) => method === "DELETE")).toBe(false);
    expect(screen.getByRole("button", { name: "Keep it" })).toHaveFocus();
    await user.click(screen.getByRole("button", { name: "Withdraw it" }));
    await waitFor(() => expect(screen.queryByRole("button", { name: /Edit the reply/ })).not.toBeInTheDocument());
    expect(asked.filter(({ method }) => method === "DELETE")).toHaveLength(1);
  });

  it("are words and links, never markup; withdrawn ones say so", async () => {
    show([
      remark("r1", { text: 'See https://vihe.example/a_(b). <b onclick="x()">bold</b> javascript:alert(1)' }),
      remark("r2", { text: "", withdrawnAt: at, replies: onSymmetry.replies }),
    ]);
    const link = await screen.findByRole("link", { name: "https://vihe.example/a_(b)" });
    expect(link).toHaveAttribute("rel", "noopener nofollow");
    expect(screen.getByText(/<b onclick="x\(\)">bold<\/b> javascript:alert\(1\)/)).toBeInTheDocument();
    expect(screen.getByText("withdrawn")).toBeInTheDocument();
  });
});

describe("all remarks of a study", () => {
  it("are chosen by what became of them and by person, those of removed cells included", async () => {
    answering({
      "GET /api/studies/s/remarks": [
        remark("r0", { cellName: "old prices", cellIsThere: false, text: "Which year?" }),
        remark("r2", { author: ilse, settled: { by: tomas, at } }),
        onSymmetry,
      ],
    });
    const setting: RemarkSetting = { studyId: "s", me: ilse, isAlone: false, colourOf: () => undefined };
    const onGo = vi.fn();
    const { user } = renderPart(<RemarksDialog setting={setting} onClose={() => {}} onGo={onGo} />);
    expect(await screen.findByText("2 remarks")).toBeInTheDocument();
    expect(screen.getByText("old prices").parentElement).toHaveTextContent("the cell is not in the study any more");
    await user.click(screen.getByRole("button", { name: "Settled" }));
    expect(screen.getByText("1 remark")).toBeInTheDocument();
    await user.click(screen.getByRole("button", { name: "All" }));
    await user.selectOptions(screen.getByRole("combobox", { name: "By" }), "Ilse Marchetti");
    expect(screen.getByText("2 remarks")).toBeInTheDocument();
    await user.click(screen.getAllByRole("button", { name: "Go to base" })[0]);
    expect(onGo).toHaveBeenCalled();
  });
});

describe("in words", () => {
  it("letters go on after z, and places anchored come first", () => {
    expect([0, 25, 26, 27, 702].map(letterAt)).toEqual(["a", "z", "aa", "ab", "aaa"]);
    const letters = lettersOf([remark("whole"), onSymmetry]);
    expect([letters.get("r1"), letters.get("whole")]).toEqual(["a", "b"]);
    expect(["verdict Symmetry", "row Log size", "key form"].map(anchorInWords)).toEqual([
      "Symmetry",
      "the row Log size",
      "the key form",
    ]);
  });

  it("addresses end where the sentence goes on", () => {
    const found = (text: string) => partsOf(text).flatMap(({ address }) => address ?? []);
    expect(found("(https://vihe.example/x), http://vihe.example?a=1; https://a_(b)")).toEqual([
      "https://vihe.example/x",
      "http://vihe.example?a=1",
      "https://a_(b)",
    ]);
    expect(found("ftp://vihe.example, javascript:alert(1), https://")).toEqual([]);
    expect(partsOf("no address").map(({ text }) => text)).toEqual(["no address"]);
  });

  it("news are what others did", () => {
    const after = {
      ...onSymmetry,
      replies: [...onSymmetry.replies, { ...onSymmetry.replies[0], id: "p2", author: tomas }],
    };
    expect(newsIn([onSymmetry], [after, remark("r2")], "i")).toBe(
      "Tomás Adeyemi replied on base. Tomás Adeyemi wrote a remark on base.",
    );
    expect(newsIn([onSymmetry], [after, remark("r2")], "t")).toBe("");
    expect(newsIn([onSymmetry], [{ ...onSymmetry, settled: { by: tomas, at } }], "i")).toBe(
      "Tomás Adeyemi settled a remark on base.",
    );
  });
});
