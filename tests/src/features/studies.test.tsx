import { screen, within } from "@testing-library/react";
import { afterEach, beforeEach, describe, expect, it, vi } from "vitest";
import type { Person, StudySummary } from "../../../shared/schemas/resources.ts";
import StudiesPage from "../../../src/app/pages/studies.tsx";
import { belongingInWords, peopleInWords, stateCounts } from "../../../src/features/studies/study-words.ts";
import { type Asked, answering, renderPart } from "../answering.tsx";

const ilse: Person = { id: "i", name: "Ilse Marchetti", email: "ilse.marchetti@vihe.example", role: "owner" };
const tomas: Person = { id: "t", name: "Tomás Adeyemi", email: "tomas.adeyemi@vihe.example", role: "coauthor" };
const petra: Person = { id: "p", name: "Petra Vance", email: "petra.vance@vihe.example", role: "reader" };

const food: StudySummary = {
  id: "food",
  title: "Food demand in Velmark, 2029–31",
  lede: "Six groups of goods and a levy on sweet drinks.",
  role: "owner",
  people: [ilse, tomas, petra],
  changedAt: "2031-03-12T13:00:00.000Z",
  cells: [
    { name: "survey", state: "current", reads: [] },
    { name: "base", state: "current", reads: ["survey"] },
    { name: "linear", state: "out of date", reads: ["survey"] },
  ],
  sealedAt: "2031-03-09T10:00:00.000Z",
};
const heating: StudySummary = {
  id: "heating",
  title: "Heating fuels and the winter of 2030",
  lede: "",
  role: "coauthor",
  people: [
    { ...ilse, role: "coauthor" },
    { ...tomas, role: "owner" },
  ],
  changedAt: "2031-03-14T13:00:00.000Z",
  cells: [],
};

let asked: Asked[];
beforeEach(() => {
  asked = answering({
    "GET /api/me": { id: "i", name: ilse.name, email: ilse.email },
    "GET /api/installation": { name: "Velmark Institute for Household Economics", version: "1", demo: [] },
    "GET /api/studies": [food, heating],
    "POST /api/studies": ({ body }: Asked) => ({ ...heating, id: "fresh", ...(body as object) }),
  });
});
afterEach(() => vi.unstubAllGlobals());

const titles = () => screen.getAllByRole("heading", { level: 2 }).map(({ textContent }) => textContent);

describe("the list of studies", () => {
  it("shows the latest change first, with states, thread and whose it is", async () => {
    renderPart(<StudiesPage />);
    await screen.findByRole("link", { name: food.title });
    expect(titles()).toEqual([heating.title, food.title]);
    const entry = screen.getByRole("link", { name: food.title }).closest("li")!;
    expect(entry).toHaveTextContent("2 current");
    expect(entry).toHaveTextContent("1 out of date");
    expect(entry).toHaveTextContent("You own it. 1 coauthor, 1 reader");
    expect(within(entry).getByRole("img", { name: /base reads survey, linear reads survey/ })).toBeInTheDocument();
    expect(screen.getByText("The installation of Velmark Institute for Household Economics.")).toBeInTheDocument();
  });

  it("filters, with the count of each filter beside it", async () => {
    const { user } = renderPart(<StudiesPage />);
    await screen.findByRole("link", { name: food.title });
    await user.click(screen.getByRole("button", { name: "Shared with you 1" }));
    expect(titles()).toEqual([heating.title]);
    await user.click(screen.getByRole("button", { name: "With a referee copy 1" }));
    expect(titles()).toEqual([food.title]);
    await user.click(screen.getByRole("button", { name: "All 2" }));
    expect(titles()).toHaveLength(2);
  });

  it("finds by title, cell and author, whatever accents are typed", async () => {
    const { user } = renderPart(<StudiesPage />);
    const find = await screen.findByRole("searchbox", { name: "Find" });
    await user.type(find, "SURVEY petra");
    expect(titles()).toEqual([food.title]);
    await user.clear(find);
    await user.type(find, "tomas heating");
    expect(titles()).toEqual([heating.title]);
    await user.clear(find);
    await user.type(find, "nothing like it");
    expect(screen.getByText("No study answers to this.")).toBeInTheDocument();
  });

  it("makes a study and goes to it; one without a title is refused where it is written", async () => {
    const { user, router } = renderPart(<StudiesPage />);
    await user.click(await screen.findByRole("button", { name: "New study" }));
    await user.click(await screen.findByRole("button", { name: "Make the study" }));
    expect(await screen.findByText("A study needs a title.")).toBeInTheDocument();
    await user.type(screen.getByLabelText("Title"), "  Six provinces  ");
    await user.click(screen.getByRole("button", { name: "Make the study" }));
    await vi.waitFor(() => expect(router.state.location.pathname).toBe("/studies/fresh"));
    expect(asked.find(({ method }) => method === "POST")?.body).toEqual({ title: "Six provinces", lede: "" });
  });
});

describe("a study in words", () => {
  it("says whose it is", () => {
    expect(belongingInWords(heating, "i")).toBe("Tomás Adeyemi owns it. You are a coauthor.");
    const two = { ...food, people: [ilse, { ...petra, role: "owner" as const }] };
    expect(belongingInWords(two, "p")).toBe("You and Ilse Marchetti own it.");
    expect(peopleInWords(food.people)).toBe("Ilse Marchetti, owner. Tomás Adeyemi, coauthor. Petra Vance, reader.");
  });

  it("counts states, those that want attention first", () => {
    const words = stateCounts(["current", "draft", "failed", "draft", "current"]).map(({ words }) => words);
    expect(words).toEqual(["1 failed", "2 drafts", "2 current"]);
  });
});
