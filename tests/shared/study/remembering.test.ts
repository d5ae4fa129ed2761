import { expect, it } from "vitest";
import { readDocument } from "../../../shared/study/document.ts";
import { remembering } from "../../../shared/study/remembering.ts";

it("a text given again is not read again, until newer ones have taken its place", () => {
  const read: string[] = [];
  const length = remembering((text) => {
    read.push(text);
    return { length: text.length };
  }, 6);
  expect(length("aaa")).toBe(length("aaa"));
  length("bbb");
  length("aaa");
  expect(read).toEqual(["aaa", "bbb"]);
  // Seven characters are too many: bbb, asked for longest ago, goes; aaa stays.
  length("c");
  length("aaa");
  expect(read).toEqual(["aaa", "bbb", "c"]);
  length("bbb");
  expect(read).toEqual(["aaa", "bbb", "c", "bbb"]);
});

it("a text longer than all that is remembered is answered all the same", () => {
  const length = remembering((text) => ({ length: text.length }), 2);
  expect(length("long")).toEqual({ length: 4 });
  expect(length("long")).toBe(length("long"));
});

it("a source is read once, however often the study is looked at", () => {
  const source = "upload: weeks.csv\ngoods: {}\n";
  expect(readDocument(source)).toBe(readDocument(source));
});
