import { statSync } from "node:fs";
import { join } from "node:path";
import { expect, test } from "vitest";
import { readConfig } from "../../../server/config.ts";
import { keptSecret } from "../../../server/storage/secret.ts";
import { temporaryFolder } from "../../support/temporary.ts";

test("says nothing: port 4780 of this machine, its own names trusted", () => {
  expect(readConfig({ PORT: "" })).toMatchObject({
    port: 4780,
    host: "127.0.0.1",
    url: "http://localhost:4780",
    trustedOrigins: ["http://localhost:4780", "http://127.0.0.1:4780", "http://[::1]:4780"],
    secure: false,
    demo: undefined,
    dataFolder: "data",
  });
});

test("an address of its own is the only one trusted, and makes cookies secure", () => {
  expect(readConfig({ TANGENCY_URL: "https://demand.vihe.example/" })).toMatchObject({
    url: "https://demand.vihe.example",
    trustedOrigins: ["https://demand.vihe.example"],
    secure: true,
  });
});

test("every variable that will not do is named, with what it is; the secret is not shown", () => {
  const read = () => readConfig({ PORT: "70000", TANGENCY_DEMO: "maybe", TANGENCY_SECRET: "short one" });
  expect(read).toThrow(
    'PORT is a port, 0 to 65535, and is "70000"; TANGENCY_DEMO is on or off, and is "maybe"; TANGENCY_SECRET has at least 32 characters.',
  );
  expect(read).not.toThrow(/short one/);
});

test("a secret is made once and readable by its owner only", () => {
  const folder = temporaryFolder();
  const secret = keptSecret(join(folder.path, "data"));
  expect(keptSecret(join(folder.path, "data"))).toBe(secret);
  expect(statSync(join(folder.path, "data", "secret")).mode & 0o777).toBe(0o600);
  folder.remove();
});
