import { afterEach, beforeEach, expect, it } from "vitest";
import { type OpenDatabase, openDatabase } from "../../server/db/client.ts";
import { CLOSE, MESSAGE } from "../../shared/schemas/sync.ts";
import type { StudyConnection } from "../../src/sync/study.ts";
import { openAs, RawClient, until } from "../support/sync-clients.ts";
import { fillDatabase, type RunningSync, STUDY, startSyncServer } from "../support/sync-server.ts";
import { temporaryFolder } from "../support/temporary.ts";

let folder: ReturnType<typeof temporaryFolder>;
let open: OpenDatabase;
let server: RunningSync;
const pages: StudyConnection[] = [];

beforeEach(async () => {
  folder = temporaryFolder();
  open = openDatabase(`${folder.path}/sync.sqlite`);
  fillDatabase(open);
  server = await startSyncServer(open);
});

afterEach(async () => {
  for (const page of pages.splice(0)) await page.close();
  await server.close();
  open.close();
  folder.remove();
});

it("everyone with the study open, readers included, is told that remarks have changed, once each time", async () => {
  pages.push(openAs("ilse", server), openAs("vera", server));
  await until(() => pages.every((page) => page.snapshot().connection.state === "connected"), "never connected");
  server.sync.remarksChanged(STUDY);
  await until(() => pages.every((page) => page.snapshot().remarksTold === 1), "never told");
  server.sync.remarksChanged("another-study");
  server.sync.remarksChanged(STUDY);
  await until(() => pages.every((page) => page.snapshot().remarksTold === 2), "never told again");
});

it("nobody but the server says so: from a client the message is unknown", async () => {
  const client = await RawClient.as("tomas", server);
  client.send(MESSAGE.remarks);
  expect((await client.closing()).code).toBe(CLOSE.malformed);
});
