import { type KeyboardEvent, useState } from "react";
import { commandOf } from "../../lib/keys.ts";
import type { ColumnChoice } from "./column-choices.ts";

interface ColumnListSetting {
  readonly value: string;
  readonly choices: readonly ColumnChoice[];
  readonly hasNone: boolean;
  readonly onChange: (value: string) => void;
}

/** A column's words that what is typed is looked for in. */
const findable = ({ name, meaning = "" }: ColumnChoice) => `${name} ${meaning}`.toLowerCase();

/** What a field that chooses a column has open: what is typed, what fits it, what is pointed at. */
export function useColumnList({ value, choices, hasNone, onChange }: ColumnListSetting) {
  const [typed, setTyped] = useState<string>();
  const [isOpen, setOpen] = useState(false);
  const [pointed, setPointed] = useState(0);
  const words = (typed ?? "").trim().toLowerCase();
  const fitting = choices.filter((choice) => findable(choice).includes(words));
  // Nothing, which is the first of the whole list; what is typed asks for a column.
  const offered: readonly (ColumnChoice | undefined)[] = hasNone && words === "" ? [undefined, ...fitting] : fitting;
  const place = Math.min(pointed, Math.max(0, offered.length - 1));

  const open = () => {
    if (isOpen) return;
    setOpen(true);
    const whole = hasNone ? [undefined, ...choices] : choices;
    setPointed(
      Math.max(
        0,
        whole.findIndex((choice) => (choice?.name ?? "") === value),
      ),
    );
  };
  const close = () => {
    setOpen(false);
    setTyped(undefined);
  };
  const choose = (choice: ColumnChoice | undefined) => {
    if ((choice?.name ?? "") !== value) onChange(choice?.name ?? "");
    close();
  };
  const type = (text: string) => {
    setTyped(text);
    setPointed(0);
    setOpen(true);
  };
  const move = (by: number) => setPointed((place + by + offered.length) % Math.max(1, offered.length));

  const onKeyDown = (event: KeyboardEvent<HTMLInputElement>) => {
    const command = commandOf("column", event);
    if (command === undefined) return;
    if (command === "giveUp") {
      // The first Escape closes the list; only the next one leaves the form.
      if (isOpen) event.stopPropagation();
      return close();
    }
    if (command === "choose" && !isOpen) return;
    event.preventDefault();
    if (command === "choose") return offered.length > 0 ? choose(offered[place]) : undefined;
    if (!isOpen) return open();
    move(command === "next" ? 1 : -1);
  };
  return { typed, isOpen, offered, place, open, close, choose, type, setPointed, onKeyDown };
}
