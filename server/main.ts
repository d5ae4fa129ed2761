import { createServer, type Server } from "node:http";
import { assemble } from "./assemble.ts";
import { type Config, readConfig } from "./config.ts";

/** The process: reads the environment, listens, says where, and stops when told to. */
const PATIENCE_MS = 10_000;
const ECHO_MS = 1_000;

// Microdata: what is written here is for the account that runs the program, and for no other.
process.umask(0o077);

let stoppingSince: number | undefined;

const say = (line: string) => console.log(line);

try {
  const config = readConfig(process.env);
  // Asked first: a demo study takes seconds to make, and a taken port should not cost them.
  await release(await listen(createServer(), config));
  const running = await assemble(config, say);
  await listen(running.server, config);
  announce(config, running.installation.demo);
  for (const signal of ["SIGINT", "SIGTERM"] as const) process.on(signal, () => stop(running.close));
} catch (error) {
  console.error(error instanceof Error ? error.message : error);
  process.exit(1);
}

function listen(server: Server, { port, host }: Config): Promise<Server> {
  return new Promise((ready, fail) => {
    server.once("error", (error: NodeJS.ErrnoException) => {
      if (error.code !== "EADDRINUSE") return fail(error);
      fail(new Error(`Port ${port} is taken by another program: stop that one, or set PORT to another.`));
    });
    server.listen(port, host, () => ready(server));
  });
}

function release(server: Server): Promise<void> {
  return new Promise((ready) => server.close(() => ready()));
}

function announce({ url }: Config, demo: readonly { email: string; passphrase: string; role: string }[]): void {
  say(`Tangency is open at ${url}`);
  if (demo.length === 0) return;
  say(`Demo sign-ins, all with the passphrase "${demo[0].passphrase}":`);
  for (const { email, role } of demo) say(`  ${email} (${role})`);
}

/** The second signal of an impatient hand ends the process at once; one that only echoes the first does not. */
function stop(close: () => Promise<void>): void {
  if (stoppingSince !== undefined) {
    if (Date.now() - stoppingSince > ECHO_MS) process.exit(1);
    return;
  }
  stoppingSince = Date.now();
  say("Stopping.");
  setTimeout(() => process.exit(1), PATIENCE_MS).unref();
  close().then(
    () => process.exit(0),
    (error: unknown) => {
      console.error(error);
      process.exit(1);
    },
  );
}
