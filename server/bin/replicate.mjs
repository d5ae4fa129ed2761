// npm run --silent replicate -- bundle.zip: estimates a replication bundle again and compares every number.
import { runSource } from "./run-source.mjs";

process.exitCode = runSource("replicate.ts");
