// npm start: installs what is missing, builds what has changed, and runs the program in this process.
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { build } from "./build.mjs";
import { install, ROOT } from "./install.mjs";

process.chdir(ROOT);
install();
build();
if (process.env.npm_lifecycle_event !== undefined) stopWithParent();
await import(pathToFileURL(join(ROOT, "dist", "server", "main.js")).href);

/** npm signals the shell it has put between itself and us, and not every shell passes that on: its end is the signal. */
function stopWithParent() {
  const parent = process.ppid;
  const watch = setInterval(() => {
    if (process.ppid === parent) return;
    clearInterval(watch);
    process.kill(process.pid, "SIGTERM");
  }, 250);
  watch.unref();
}
