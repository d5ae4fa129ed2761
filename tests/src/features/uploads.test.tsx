import { screen } from "@testing-library/react";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import type { Upload } from "../../../shared/schemas/resources.ts";
import { FileDrop } from "../../../src/features/uploads/file-drop.tsx";
import UploadsDialog from "../../../src/features/uploads/uploads-dialog.tsx";
import { answering, Refused, renderPart } from "../answering.tsx";

const purchases: Upload = {
  id: "u",
  name: "purchases-2031.csv",
  bytes: 1000,
  rows: 4938,
  sha256: "0".repeat(64),
  version: 1,
  format: "csv",
  separator: ";",
  decimalComma: true,
  uploadedAt: "2031-03-02T10:00:00.000Z",
  uploadedBy: "Ilse Marchetti",
  columns: [],
};

/** A request that goes on only when the test says so. */
class HeldRequest {
  static latest: HeldRequest;
  readonly upload: { onprogress?: (event: object) => void; onload?: () => void } = {};
  status = 0;
  responseText = "";
  sent: FormData | undefined;
  onload?: () => void;
  onabort?: () => void;
  onerror?: () => void;

  constructor() {
    HeldRequest.latest = this;
  }
  address = "";
  open(_method: string, address: string) {
    this.address = address;
  }
  setRequestHeader() {}
  send(form: FormData) {
    this.sent = form;
  }
  abort() {
    this.onabort?.();
  }
  answer(status: number, body: unknown) {
    this.status = status;
    this.responseText = JSON.stringify(body);
    this.onload?.();
  }
}

beforeEach(() => vi.stubGlobal("XMLHttpRequest", HeldRequest));
afterEach(() => vi.unstubAllGlobals());

const file = (name = "purchases-2031.csv") => new File(["a;b\n1;2\n"], name, { type: "text/csv" });

async function choose() {
  const onAdded = vi.fn();
  const view = renderPart(<FileDrop studyId="s" onAdded={onAdded} />);
  await view.user.upload(await screen.findByLabelText("Choose a file"), file());
  return { ...view, onAdded, request: HeldRequest.latest };
}

describe("an upload", () => {
  it("says how far it is, then that it is being read, then hands over what was read", async () => {
    const { onAdded, request } = await choose();
    expect(request.sent?.get("file")).toMatchObject({ name: "purchases-2031.csv" });
    request.upload.onprogress?.({ loaded: 30, total: 100 });
    expect(await screen.findByText(/^Sending purchases-2031.csv, 30\s%$/)).toBeInTheDocument();
    request.upload.onload?.();
    expect(await screen.findByText("Reading purchases-2031.csv")).toBeInTheDocument();
    request.answer(201, purchases);
    await vi.waitFor(() => expect(onAdded).toHaveBeenCalled());
    expect(onAdded.mock.calls[0][0]).toEqual(purchases);
  });

  it("that will not do names the row and the column, and leaves the way open for another", async () => {
    const { request, onAdded } = await choose();
    const problem = { sentence: "Row 2 of e_bread has abc, which is not a number.", row: 2, column: "e_bread" };
    request.answer(422, { error: { code: "refused", sentence: "The file cannot be read.", problems: [problem] } });
    expect(await screen.findByRole("alert")).toHaveTextContent("The file cannot be read.");
    expect(screen.getByText(problem.sentence)).toBeInTheDocument();
    expect(screen.getByLabelText("Choose a file")).toBeEnabled();
    expect(onAdded).not.toHaveBeenCalled();
  });

  it("can be given up, without a word of failure", async () => {
    const { user } = await choose();
    await user.click(await screen.findByRole("button", { name: "Cancel" }));
    expect(await screen.findByLabelText("Choose a file")).toBeInTheDocument();
    expect(screen.queryByRole("alert")).not.toBeInTheDocument();
  });

  it("over a hundred megabytes is refused before it is sent", async () => {
    const large = file("large.csv");
    Object.defineProperty(large, "size", { value: 123 * 1024 * 1024 });
    const { user } = renderPart(<FileDrop studyId="s" onAdded={() => {}} />);
    await user.upload(await screen.findByLabelText("Choose a file"), large);
    expect(await screen.findByRole("alert")).toHaveTextContent("large.csv has 123.0 MB; an upload may have 100 MB.");
  });
});

describe("a file of the name of an upload that is there", () => {
  async function asked() {
    const onAdded = vi.fn();
    const view = renderPart(<FileDrop studyId="s" onAdded={onAdded} />);
    view.client.setQueryData(["uploads", "s"], [purchases, { ...purchases, id: "v", version: 2 }]);
    HeldRequest.latest = undefined as unknown as HeldRequest;
    await view.user.upload(await screen.findByLabelText("Choose a file"), file());
    const question = await screen.findByRole("group", { name: "purchases-2031.csv is there already" });
    return { ...view, onAdded, question };
  }

  it("is not sent before a person has said what becomes of the one that is there", async () => {
    const { question, user } = await asked();
    expect(question).toHaveTextContent(
      "As its version 3, cells that read the latest version follow and version 2 is kept",
    );
    expect(HeldRequest.latest).toBeUndefined();
    await user.click(screen.getByRole("button", { name: "Leave it" }));
    expect(question).not.toBeInTheDocument();
    expect(screen.getByLabelText("Choose a file")).toBeEnabled();
    expect(HeldRequest.latest).toBeUndefined();
  });

  it.each([
    ["Keep it as version 3", "/api/studies/s/uploads?replaces=purchases-2031.csv"],
    ["Put it beside", "/api/studies/s/uploads?beside=1"],
  ])("goes out by %s as what was chosen", async (word, address) => {
    const { user, onAdded } = await asked();
    await user.click(screen.getByRole("button", { name: word }));
    expect(HeldRequest.latest.address).toBe(address);
    const added = { ...purchases, id: "w", version: 3 };
    HeldRequest.latest.answer(201, added);
    await vi.waitFor(() => expect(onAdded.mock.calls[0]?.[0]).toEqual(added));
  });

  it("may be chosen again after it was refused, and the question stands in the place of the fault", async () => {
    const { user } = await asked();
    await user.click(screen.getByRole("button", { name: "Put it beside" }));
    const sentence = "You may read this study and add nothing to it.";
    HeldRequest.latest.answer(403, { error: { code: "forbidden", sentence, problems: [] } });
    expect(await screen.findByRole("alert")).toHaveTextContent(sentence);
    await user.upload(screen.getByLabelText("Choose a file"), file());
    expect(await screen.findByRole("group", { name: /is there already/ })).toBeInTheDocument();
    expect(screen.queryByRole("alert")).not.toBeInTheDocument();
  });
});

describe("the uploads of a study", () => {
  it("are listed with their shape; one that a cell names stays", async () => {
    const sentence = "purchases-2031.csv stays: the cell survey names it.";
    answering({
      "GET /api/studies/s/uploads": [purchases],
      "DELETE /api/studies/s/uploads/u": new Refused(409, sentence),
    });
    const { user } = renderPart(<UploadsDialog studyId="s" onClose={() => {}} readOnly={false} />);
    expect(await screen.findByText(/4,938 rows, 0 columns; uploaded by Ilse Marchetti/)).toHaveTextContent(
      "parted by semicolons, decimal commas",
    );
    await user.click(screen.getByRole("button", { name: "Remove purchases-2031.csv" }));
    expect(await screen.findByRole("alert")).toHaveTextContent(sentence);
  });

  it("cannot be changed by a reader", async () => {
    answering({ "GET /api/studies/s/uploads": [purchases] });
    renderPart(<UploadsDialog studyId="s" onClose={() => {}} readOnly />);
    await screen.findByText("purchases-2031.csv");
    expect(screen.queryByRole("button", { name: /Remove/ })).not.toBeInTheDocument();
    expect(screen.queryByLabelText("Choose a file")).not.toBeInTheDocument();
  });
});
