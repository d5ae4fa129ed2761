import { writeFileSync } from "node:fs";
import { join } from "node:path";
import { afterAll, expect, test } from "vitest";
import { lockFolder } from "../../../server/storage/lock.ts";
import { temporaryFolder } from "../../support/temporary.ts";

const folder = temporaryFolder();
afterAll(() => folder.remove());

test("a folder is one program's at a time", () => {
  const path = join(folder.path, "data");
  const unlock = lockFolder(path);
  expect(() => lockFolder(path)).toThrow(`The data in ${path} are in use by another Tangency`);
  unlock();
  lockFolder(path)();
});

test("a place where no data can be kept is told by its name, with what to do", () => {
  const path = join(folder.path, "a-file");
  writeFileSync(path, "");
  for (const place of [path, join(path, "below")]) {
    expect(() => lockFolder(place)).toThrow(/^Data cannot be kept in .*a-file.* \(E[A-Z]+\): .*TANGENCY_DATA/);
  }
});
