import { render, screen } from "@testing-library/react";
import userEvent from "@testing-library/user-event";
import { useState } from "react";
import { describe, expect, it } from "vitest";
import type { Upload } from "../../../shared/schemas/resources.ts";
import { agreementInWords, columnChoices } from "../../../src/cells/data/column-choices.ts";
import { ColumnChooser } from "../../../src/cells/data/column-chooser.tsx";
import { exampleUpload } from "../../support/example-upload.ts";

const same = { of: ["q_sweet"], times: 1.5, is: "q_sweet_l", agree: 96, compared: 100 };
const upload: Upload = {
  ...exampleUpload(["village", "members"]),
  columns: [
    { name: "village", type: "text", missing: 0, distinct: 12, firstValues: ["Ålund", "Berg"] },
    { name: "members", type: "number", missing: 5, distinct: 9, minimum: 1, maximum: 12, zeros: 0 },
    {
      name: "q_sweet",
      type: "number",
      missing: 0,
      distinct: 90,
      minimum: -0.5,
      maximum: 12.3456,
      zeros: 3,
      firstValues: ["-0.5", "1.5", "12.3456"],
      agreements: [same],
    },
  ],
};

function Chooser({ first, onChosen }: { first: string; onChosen: (column: string) => void }) {
  const [column, setColumn] = useState(first);
  return (
    <ColumnChooser
      aria-label="Quantity of sweet drinks"
      value={column}
      choices={columnChoices(upload, ["log_size"], false)}
      none="expenditure ÷ price"
      readOnly={false}
      onChange={(next) => {
        onChosen(next);
        setColumn(next);
      }}
    />
  );
}

function open(value = "") {
  const chosen: string[] = [];
  render(<Chooser first={value} onChosen={(column) => chosen.push(column)} />);
  return { user: userEvent.setup(), chosen, field: screen.getByRole("combobox", { name: "Quantity of sweet drinks" }) };
}

describe("a field that chooses a column", () => {
  it("says of each what its name says, its range and its first values, and what it says again", async () => {
    const { user, field } = open();
    expect(field).toHaveAttribute("aria-expanded", "false");
    await user.click(field);
    const options = await screen.findAllByRole("option");
    expect(options.map((option) => option.textContent)).toEqual([
      "expenditure ÷ price",
      "village text, 12 values may be a cluster Ålund, Berg",
      "members 1 to 12, 5.0\u2009% missing may describe who buys ",
      "q_sweet −0.5 to 12.35, 3.0\u2009% zero quantity of sweet −0.5, 1.5, 12.3456",
      "log_size derived not recognised ",
    ]);
    expect(screen.queryByText(/within 2/)).not.toBeInTheDocument();
    await user.keyboard("{ArrowDown}{ArrowDown}{ArrowDown}");
    expect(field).toHaveAttribute("aria-activedescendant", options[3].id);
    expect(screen.getByRole("status")).toHaveTextContent(/^1.5 × q_sweet is q_sweet_l within 2/);
  });

  it("is used by the keyboard alone: what is typed finds, Enter chooses, Escape leaves all as it was", async () => {
    const { user, field, chosen } = open("members");
    await user.tab();
    expect(field).toHaveFocus();
    expect(screen.queryByRole("listbox")).not.toBeInTheDocument();
    await user.keyboard("SWEET");
    expect((await screen.findAllByRole("option")).map(({ id }) => id)).toEqual([
      field.getAttribute("aria-activedescendant"),
    ]);
    await user.keyboard("{Escape}");
    expect(screen.queryByRole("listbox")).not.toBeInTheDocument();
    expect(field).toHaveValue("members");
    await user.keyboard("{ArrowDown}{ArrowDown}{Enter}");
    expect(chosen).toEqual(["q_sweet"]);
    await user.keyboard("{ArrowDown}{ArrowUp}{ArrowUp}{ArrowUp}{Enter}");
    expect([chosen.at(-1), (field as HTMLInputElement).value]).toEqual(["", ""]);
    await user.keyboard("nothing of the kind{Enter}");
    expect(screen.getByText("No column fits what is typed.")).toBeInTheDocument();
    await user.tab();
    expect(chosen).toEqual(["q_sweet", ""]);
    expect(field).toHaveValue("");
  });

  it("keeps a column that is not there in sight", () => {
    const { field } = open("q_swete");
    expect(field).toHaveValue("q_swete, not known here");
    expect(field).toBeInvalid();
  });
});

describe("whether columns agree", () => {
  const product = { of: ["p_milk", "q_milk"], times: 1, is: "e_milk", agree: 4700, compared: 4812 };
  it.each([
    [product, "p_milk × q_milk is e_milk within 2\u2009%, in 4,700 of 4,812 rows."],
    [
      { ...product, agree: 31 },
      "p_milk × q_milk is e_milk within 2\u2009%, in 31 of 4,812 rows. They do not say the same.",
    ],
    [
      { ...product, times: 0.010004 },
      "0.01 × p_milk × q_milk is e_milk within 2\u2009%, in 4,700 of 4,812 rows. Their units differ.",
    ],
    [same, "1.5 × q_sweet is q_sweet_l within 2\u2009%, in 96 of 100 rows."],
    [{ ...product, agree: 0, compared: 0 }, "No row has p_milk and q_milk and e_milk."],
  ])("is said with how many rows", (agreement, sentence) => {
    expect(agreementInWords(agreement)).toBe(sentence);
  });
});
