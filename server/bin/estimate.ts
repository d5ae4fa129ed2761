import { readFile } from "node:fs/promises";
import { resolve } from "node:path";
import { parseArgs } from "node:util";
import { readConfig, threadsOfOneComputation } from "../config.ts";
import type { RunControl } from "../engine/run.ts";
import { startThreads } from "../engine/threads/start-threads.ts";
import { type Complaint, estimateStudy } from "./estimate-study.ts";

/**
 * The command line: a study file in, the findings of its cells as JSON on standard output, what is wrong
 * on standard error as file:line:column: key: sentence. Exit 0 when every finding is there, 1 when a person
 * has something to mend (then nothing is on standard output), 2 when called wrongly.
 */
const USAGE = `npm run --silent estimate -- study.yaml [--only CELL] [--pretty]

  study.yaml   a study as one file; data paths are relative to it
  --only CELL  this cell and what it reads, and only its finding; may be given several times
  --pretty     the JSON indented`;

process.exitCode = await main(process.argv.slice(2));

async function main(words: string[]): Promise<number> {
  const called = readWords(words);
  if (typeof called === "string") return misused(called);
  const { file, only, pretty, help } = called;
  if (help) {
    process.stdout.write(`${USAGE}\n`);
    return 0;
  }
  const path = resolve(process.env.TANGENCY_CALLED_FROM ?? process.cwd(), file);
  const text = await readFile(path, "utf8").catch((error: NodeJS.ErrnoException) => error);
  if (typeof text !== "string") return misused(`${file} cannot be read (${text.code}).`);
  const { findings, complaints } = await estimateStudy(text, path, { only, control: control() });
  clearProgress();
  for (const complaint of complaints) process.stderr.write(`${printed(file, complaint)}\n`);
  if (complaints.length > 0) return 1;
  process.stdout.write(`${JSON.stringify(findings, undefined, pretty ? 2 : undefined)}\n`);
  return 0;
}

function readWords(words: string[]) {
  try {
    const { values, positionals } = parseArgs({
      args: words,
      allowPositionals: true,
      options: {
        only: { type: "string", multiple: true, default: [] },
        pretty: { type: "boolean", default: false },
        help: { type: "boolean", default: false },
      },
    });
    if (!values.help && positionals.length !== 1) {
      return `One study file is needed, and ${positionals.length} are named.`;
    }
    return { file: positionals[0] ?? "", ...values };
  } catch (error) {
    return error instanceof Error ? error.message : String(error);
  }
}

function misused(sentence: string): number {
  process.stderr.write(`${sentence}\n\n${USAGE}\n`);
  return 2;
}

function printed(file: string, { place, key, sentence }: Complaint): string {
  const where = place ? `${file}:${place.line}:${place.column}` : file;
  const line = key === "" ? `${where}: ${sentence}` : `${where}: ${key}: ${sentence}`;
  // A name from someone else's file is shown on a terminal, which would obey the control characters in it.
  return line.replace(/\p{Cc}/gu, "\uFFFD");
}

/** On a terminal, one line says how far it is; elsewhere nothing but errors is said. */
function control(): RunControl {
  let said = 0;
  return {
    progress({ step, iteration, logLikelihood }) {
      if (!process.stderr.isTTY || performance.now() - said < 100) return;
      said = performance.now();
      const at = iteration === undefined ? "" : `, iteration ${iteration}`;
      const likelihood = logLikelihood === undefined ? "" : `, log-likelihood ${logLikelihood.toFixed(4)}`;
      process.stderr.write(`\r\u001b[K${step}${at}${likelihood}`);
    },
    cancelled: () => false,
    threads: startThreads(threadsOfOneComputation(readConfig(process.env))),
  };
}

function clearProgress(): void {
  if (process.stderr.isTTY) process.stderr.write("\r\u001b[K");
}
