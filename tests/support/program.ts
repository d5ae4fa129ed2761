import { type ChildProcess, spawn } from "node:child_process";
import { once } from "node:events";
import type { AddressInfo } from "node:net";
import { createServer } from "node:net";
import { join } from "node:path";

const ROOT = join(import.meta.dirname, "..", "..");

interface Options {
  readonly dataFolder: string;
  readonly port?: number;
  /** The compiled program of dist/, pages included, in place of the sources. */
  readonly built?: boolean;
  readonly env?: Record<string, string>;
}

/** The whole program as a process of its own, once it says that it is open. */
export async function startProgram({ dataFolder, port, built = false, env = {} }: Options) {
  const chosen = port ?? (await freePort());
  const words = built ? ["dist/server/main.js"] : ["--import", "tsx", "server/main.ts"];
  const child = spawn(process.execPath, words, {
    cwd: ROOT,
    stdio: ["ignore", "pipe", "pipe"],
    // Under test variables some packages leave their checks out; this is to be the program as it runs.
    env: {
      ...process.env,
      VITEST: "",
      TEST: "",
      NODE_ENV: "production",
      PORT: String(chosen),
      TANGENCY_DATA: dataFolder,
      ...env,
    },
  });
  let said = "";
  for (const stream of [child.stdout, child.stderr]) {
    stream.setEncoding("utf8").on("data", (text: string) => {
      said += text;
    });
  }
  await untilOpen(child, () => said);
  return {
    origin: `http://localhost:${chosen}`,
    port: chosen,
    /** Everything printed so far. */
    said: () => said,
    /** Sends the signal and waits for the end; the exit code, null after SIGKILL. */
    async stop(signal: "SIGTERM" | "SIGKILL" = "SIGTERM"): Promise<number | null> {
      const ended = once(child, "exit");
      child.kill(signal);
      const [code] = (await ended) as [number | null];
      return code;
    },
  };
}

async function untilOpen(child: ChildProcess, said: () => string): Promise<void> {
  while (!said().includes("Tangency is open at")) {
    if (child.exitCode !== null) throw new Error(`The program ended with ${child.exitCode}: ${said()}`);
    await new Promise((resolve) => setTimeout(resolve, 20));
  }
}

export async function freePort(): Promise<number> {
  const server = createServer().listen(0, "127.0.0.1");
  await once(server, "listening");
  const { port } = server.address() as AddressInfo;
  server.close();
  await once(server, "close");
  return port;
}
