// npm run --silent estimate -- study.yaml: estimates a study file without a server.
import { runSource } from "./run-source.mjs";

process.exitCode = runSource("estimate.ts");
