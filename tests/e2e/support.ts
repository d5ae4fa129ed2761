import { type ChildProcess, spawn } from "node:child_process";
import { cpSync, existsSync } from "node:fs";
import type { AddressInfo } from "node:net";
import { createServer } from "node:net";
import { fileURLToPath } from "node:url";
import { type Browser, type BrowserContext, chromium, type Page } from "playwright-core";
import { temporaryFolder } from "../support/temporary.ts";

const ROOT = fileURLToPath(new URL("../..", import.meta.url));
const PROGRAM = fileURLToPath(new URL("../../dist/server/main.js", import.meta.url));
const SHELL = "/usr/bin/chromium-headless-shell";
const BROWSER = process.env.CHROMIUM_PATH || (existsSync(SHELL) ? SHELL : "/usr/bin/chromium");
const FLAGS = [
  "--no-sandbox",
  "--disable-dev-shm-usage",
  "--disable-quic",
  "--no-first-run",
  "--disable-background-networking",
  "--disable-component-update",
  "--disable-sync",
  // Dates and numbers follow the browser: one custom for every machine that runs these.
  "--accept-lang=en-GB",
];
/** How long anything is waited for: long, because the machine may have more to do; what fails for good costs it once. */
export const PATIENCE = 90_000;
/** A demo study is simulated, written and estimated. */
const START_PATIENCE = 3 * PATIENCE;

export const PASSPHRASE = "the levy on sweet drinks";
export const ILSE = { name: "Ilse Marchetti", email: "ilse.marchetti@vihe.example" };
export const TOMAS = { name: "Tomás Adeyemi", email: "tomas.adeyemi@vihe.example" };
export const PETRA = { name: "Petra Vance", email: "petra.vance@vihe.example" };

/**
 * Conventions of these files. They run beside one another and beside the other tests, so a step waits for what it needs
 * to see and never for a time. A `Product` begins with the demo study, copied from one made before the first file
 * (`demo-data.ts`); where a study must be made by the program itself, see tests/server/program.test.ts.
 */

/** The built program over a folder of data of its own, which outlives it until `remove`. */
export class Product {
  readonly #folder = temporaryFolder();
  #child: ChildProcess | undefined;
  #port = 0;

  static async start(): Promise<Product> {
    if (!existsSync(PROGRAM))
      throw new Error("The program is not built: npm test builds it, and so does npm run build.");
    const product = new Product();
    const demo = process.env.E2E_DEMO_DATA;
    if (demo !== undefined) cpSync(demo, product.folder, { recursive: true });
    product.#port = await freePort();
    await product.start().catch(async (error: unknown) => {
      await product.remove();
      throw error;
    });
    return product;
  }

  get origin(): string {
    return `http://localhost:${this.#port}`;
  }

  get folder(): string {
    return this.#folder.path;
  }

  get database(): string {
    return `${this.folder}/tangency.sqlite`;
  }

  async start(): Promise<void> {
    const child = spawn(process.execPath, [PROGRAM], {
      cwd: ROOT,
      stdio: ["ignore", "pipe", "inherit"],
      env: {
        ...process.env,
        VITEST: "",
        TEST: "",
        NODE_ENV: "production",
        PORT: String(this.#port),
        TANGENCY_DATA: this.folder,
        TANGENCY_SIGN_INS_PER_MINUTE: "1000",
      },
    });
    this.#child = child;
    await new Promise<void>((ready, failed) => {
      const patience = setTimeout(() => failed(new Error("The program did not say that it is open.")), START_PATIENCE);
      child.stdout?.on("data", (words: Buffer) => {
        if (!words.toString().includes("Tangency is open at")) return;
        clearTimeout(patience);
        ready();
      });
      child.once("exit", (code) => failed(new Error(`The program ended with ${code} before it was open.`)));
    });
  }

  /** Ends the program in the middle of whatever it does. */
  kill(): Promise<void> {
    return this.#end("SIGKILL");
  }

  /** Ends the program as whoever keeps it would. */
  stop(): Promise<void> {
    return this.#end("SIGTERM");
  }

  async remove(): Promise<void> {
    await this.stop();
    this.#folder.remove();
  }

  async #end(signal: NodeJS.Signals): Promise<void> {
    const child = this.#child;
    this.#child = undefined;
    if (child === undefined || child.exitCode !== null || child.signalCode !== null) return;
    const ended = new Promise((resolve) => child.once("exit", resolve));
    child.kill(signal);
    await ended;
  }
}

export async function openBrowser(): Promise<Browser> {
  const browser = await chromium.launch({ executablePath: BROWSER, args: FLAGS });
  browser.on("context", (context) => context.setDefaultTimeout(PATIENCE));
  return browser;
}

/** Someone with a browser profile of their own, signed in through the page. */
export async function signIn(
  browser: Browser,
  product: Product,
  { email }: { email: string },
  prepare: (context: BrowserContext) => Promise<void> = async () => {},
): Promise<Page> {
  const context = await browser.newContext({ baseURL: product.origin, viewport: { width: 1440, height: 1000 } });
  await prepare(context);
  const page = await context.newPage();
  await page.goto("/sign-in");
  await page.getByLabel("Email").fill(email);
  await page.getByLabel("Passphrase", { exact: true }).fill(PASSPHRASE);
  await page.getByRole("button", { name: "Sign in", exact: true }).click();
  await page.waitForURL((url) => url.pathname === "/");
  return page;
}

/** The address of the page behind the link in the newest message to someone, as the administrator finds it in the post box. */
export async function linkSentTo(product: Product, email: string): Promise<string> {
  const headers = { origin: product.origin, "content-type": "application/json" };
  const body = JSON.stringify({ email: ILSE.email, password: PASSPHRASE });
  const answer = await fetch(`${product.origin}/api/auth/sign-in/email`, { method: "POST", headers, body });
  const cookie = answer.headers.getSetCookie()[0].split(";")[0];
  const end = Date.now() + PATIENCE;
  while (Date.now() < end) {
    const box = await fetch(`${product.origin}/api/administration/mails`, { headers: { cookie } });
    const { mails } = (await box.json()) as { mails: { to: string; text?: string }[] };
    const link = /https?:\/\/[^/\s]+(\/\S+)/.exec(mails.find(({ to }) => to === email)?.text ?? "");
    if (link !== null) return link[1];
    await new Promise((later) => setTimeout(later, 50));
  }
  throw new Error(`No message to ${email}.`);
}

/** The id of the only study there is. */
export async function demoStudyId(page: Page): Promise<string> {
  const answer = await page.request.get("/api/studies");
  const [study] = (await answer.json()) as { id: string }[];
  return study.id;
}

async function freePort(): Promise<number> {
  const server = createServer();
  await new Promise<void>((ready) => server.listen(0, "127.0.0.1", ready));
  const { port } = server.address() as AddressInfo;
  await new Promise((closed) => server.close(closed));
  return port;
}
