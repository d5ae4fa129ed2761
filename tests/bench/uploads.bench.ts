import { startProgram } from "../support/program.ts";
import { temporaryFolder } from "../support/temporary.ts";

/** How long a large file takes to come in and be read, and how long others wait for an answer meanwhile. */
const BYTES = 90e6;
const COLUMNS = 8;

const table = new Blob([tableOf(BYTES)]);
const folder = temporaryFolder();
const program = await startProgram({ dataFolder: folder.path });
const { origin } = program;
const { demo } = await (await fetch(`${origin}/api/installation`)).json();
const json = { origin, "content-type": "application/json" };
const signedIn = await fetch(`${origin}/api/auth/sign-in/email`, {
  method: "POST",
  headers: json,
  body: JSON.stringify({ email: demo[0].email, password: demo[0].passphrase }),
});
const cookie = signedIn.headers.getSetCookie()[0].split(";")[0];

let running = true;
const waits = { "a read": [] as number[], "a write": [] as number[] };
const others = [
  again(waits["a read"], () => fetch(`${origin}/api/me`, { headers: { cookie } })),
  again(waits["a write"], () =>
    fetch(`${origin}/api/studies/demo`, {
      method: "PATCH",
      headers: { ...json, cookie },
      body: JSON.stringify({ lede: String(Date.now()) }),
    }),
  ),
];

const form = new FormData();
form.set("file", table, "large.csv");
const began = performance.now();
const answer = await fetch(`${origin}/api/studies/demo/uploads`, {
  method: "POST",
  headers: { origin, cookie },
  body: form,
});
const { rows } = await answer.json();
const took = performance.now() - began;
running = false;
await Promise.all(others);
console.log(
  `  ${BYTES / 1e6} MB, ${rows} rows of ${COLUMNS}: answered ${answer.status} after ${(took / 1000).toFixed(1)} s`,
);
for (const [what, times] of Object.entries(waits)) {
  times.sort((a, b) => a - b);
  const at = (share: number) => times[Math.floor(share * (times.length - 1))].toFixed(0);
  console.log(`  ${what} meanwhile: median ${at(0.5)} ms, p95 ${at(0.95)} ms, longest ${at(1)} ms (${times.length})`);
}
await program.stop();
folder.remove();

async function again(times: number[], ask: () => Promise<Response>): Promise<void> {
  while (running) {
    const start = performance.now();
    await (await ask()).arrayBuffer();
    times.push(performance.now() - start);
    await new Promise((resolve) => setTimeout(resolve, 10));
  }
}

function tableOf(bytes: number): string {
  const lines = [Array.from({ length: COLUMNS }, (_, i) => `c${i}`).join(",")];
  for (let size = 0, row = 1; size < bytes; row += 1) {
    const line = Array.from({ length: COLUMNS }, (_, i) =>
      (((row * 7919 + i * 104729) % 1000003) / 997).toFixed(4),
    ).join(",");
    size += line.length + 1;
    lines.push(line);
  }
  return `${lines.join("\n")}\n`;
}
