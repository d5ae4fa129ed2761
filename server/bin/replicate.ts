import { resolve } from "node:path";
import { parseArgs } from "node:util";
import { ENOUGH } from "../bundle/compare-findings.ts";
import { readConfig, threadsOfOneComputation } from "../config.ts";
import { Refusal } from "../engine/refusal.ts";
import { startThreads } from "../engine/threads/start-threads.ts";
import { VERSION } from "../root.ts";
import { replicateBundle } from "./replicate-bundle.ts";
import type { Replication } from "./replication.ts";
import { isReplicated, replicationInWords } from "./replication-words.ts";

/**
 * The command line: a replication bundle in, what agrees and to how many digits on standard output. Exit 0 when everything
 * that was compared agrees and nothing was left unchecked, 1 when something differs or could not be checked, 2 when called wrongly.
 */
const USAGE = `npm run --silent replicate -- bundle.zip [data.csv …] [--json]

  bundle.zip  a replication bundle
  data.csv    the files it was made from, where it does not hold them
  --json      the comparison as JSON

Numbers agree with ${ENOUGH} digits or more, or where they differ by rounding alone (1e-12).`;

process.exitCode = await main(process.argv.slice(2));

async function main(words: string[]): Promise<number> {
  const called = readWords(words);
  if (typeof called === "string") return misused(called);
  if (called.help) {
    process.stdout.write(`${USAGE}\n`);
    return 0;
  }
  const [bundle, ...data] = called.paths.map((path) =>
    resolve(process.env.TANGENCY_CALLED_FROM ?? process.cwd(), path),
  );
  const replication = await replicateBundle(bundle, data, {
    progress() {},
    cancelled: () => false,
    threads: startThreads(threadsOfOneComputation(readConfig(process.env))),
  }).catch((error: unknown) => error as Error);
  if (replication instanceof Error) return unreadable(replication);
  process.stdout.write(called.json ? `${JSON.stringify(replication, undefined, 2)}\n` : inWords(replication));
  return isReplicated(replication) ? 0 : 1;
}

const inWords = (replication: Replication) => replicationInWords(replication, `Tangency ${VERSION}`);

function readWords(words: string[]) {
  try {
    const { values, positionals } = parseArgs({
      args: words,
      allowPositionals: true,
      options: { json: { type: "boolean", default: false }, help: { type: "boolean", default: false } },
    });
    if (!values.help && positionals.length === 0) return "One bundle is needed, and none is named.";
    return { paths: positionals, ...values };
  } catch (error) {
    return error instanceof Error ? error.message : String(error);
  }
}

function misused(sentence: string): number {
  process.stderr.write(`${sentence}\n\n${USAGE}\n`);
  return 2;
}

/** What is wrong with the files is a person's to mend; anything else is a fault of the program. */
function unreadable(error: Error): number {
  const { code, path } = error as NodeJS.ErrnoException;
  if (error instanceof Refusal) process.stderr.write(`${error.message}\n`);
  else if (code !== undefined && path !== undefined) process.stderr.write(`${path} cannot be read (${code}).\n`);
  else throw error;
  return 2;
}
