// npm run dev: the server from its sources, started again when they change, with Vite inside it for the pages.
import { spawn } from "node:child_process";
import { join } from "node:path";
import { install, ROOT } from "./install.mjs";

install();
const tsx = join(ROOT, "node_modules", "tsx", "dist", "cli.mjs");
const child = spawn(process.execPath, [tsx, "watch", "--clear-screen=false", "server/main.ts"], {
  cwd: ROOT,
  stdio: "inherit",
  env: { ...process.env, TANGENCY_DEVELOPMENT: "on" },
});
for (const signal of ["SIGINT", "SIGTERM"]) process.on(signal, () => child.kill(signal));
child.on("exit", (code, signal) => process.exit(code ?? (signal === null ? 1 : 0)));
