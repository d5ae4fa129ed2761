// npm start: installs what is missing, builds what has changed, and runs the program in this process.
import { join } from "node:path";
import { pathToFileURL } from "node:url";
import { build } from "./build.mjs";
import { install, ROOT } from "./install.mjs";

process.chdir(ROOT);
install();
build();
await import(pathToFileURL(join(ROOT, "dist", "server", "main.js")).href);
