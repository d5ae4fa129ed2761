import { availableParallelism } from "node:os";
import { z } from "zod";

const flag = z
  .enum(["on", "off", "true", "false", "1", "0"], { error: "is on or off" })
  .transform((word) => word === "on" || word === "true" || word === "1");

const wholeNumber = (fallback: number) =>
  z.coerce.number({ error: "is a whole number" }).int("is a whole number").positive("is above 0").default(fallback);

/** Everything the environment may say, read once; nothing else in the program looks at it. */
const environment = z.object({
  PORT: z.coerce
    .number({ error: "is a port, 0 to 65535" })
    .int("is a port, 0 to 65535")
    .min(0, "is a port, 0 to 65535")
    .max(65535, "is a port, 0 to 65535")
    .default(4780),
  /** Which address to listen on. This machine only, unless said otherwise: the demo's passphrase is public. */
  TANGENCY_HOST: z.string().min(1).default("127.0.0.1"),
  /** The address people type, when it is not http://localhost:PORT. */
  TANGENCY_URL: z.url({ protocol: /^https?$/, error: "is an address beginning http:// or https://" }).optional(),
  TANGENCY_DATA: z.string().min(1).default("data"),
  TANGENCY_DEMO: flag.optional(),
  TANGENCY_SECRET: z.string().min(32, "has at least 32 characters").optional(),
  /** Signed in under one of these addresses, parted by commas, one administers the installation. */
  TANGENCY_ADMINISTRATORS: z
    .string()
    .transform((list) => list.split(",").map((address) => address.trim().toLowerCase()))
    .pipe(z.array(z.email("holds something that is not an e-mail address")))
    .optional(),
  /** The mail server. Without one, messages stay in a local post box that administrators read. */
  TANGENCY_SMTP_URL: z
    .url({ protocol: /^smtps?$/, hostname: z.regexes.hostname, error: "is an address beginning smtp:// or smtps://" })
    .optional(),
  /** Whom messages come from, for instance "Tangency <tangency@institute.example>". */
  TANGENCY_MAIL_FROM: z.string().min(3).max(200).optional(),
  /** How many proxies stand in front and may be believed about the address of the client. */
  TANGENCY_PROXIES: z.coerce.number({ error: "is a whole number" }).int("is a whole number").min(0).default(0),
  TANGENCY_THREADS: z.coerce.number({ error: "is a whole number" }).int().positive().optional(),
  TANGENCY_LOG: z.enum(["silent", "fatal", "error", "warn", "info", "debug"]).default("warn"),
  TANGENCY_SIGN_INS_PER_MINUTE: wholeNumber(30),
  TANGENCY_UPLOADS_PER_HOUR: wholeNumber(120),
  TANGENCY_REFEREE_READS_PER_MINUTE: wholeNumber(120),
  TANGENCY_MAILS_PER_HOUR: wholeNumber(60),
  TANGENCY_DEVELOPMENT: flag.default(false),
});

export interface Config {
  readonly port: number;
  readonly host: string;
  /** Without a slash at its end. */
  readonly url: string;
  readonly trustedOrigins: readonly string[];
  readonly secure: boolean;
  readonly dataFolder: string;
  /** What the environment says; undefined leaves it to whether the database is new. */
  readonly demo: boolean | undefined;
  readonly secret: string | undefined;
  /** In small letters. */
  readonly administrators: readonly string[];
  /** Undefined: messages stay in the local post box. */
  readonly smtp: { readonly url: string; readonly from: string } | undefined;
  readonly proxies: number;
  readonly threads: number | undefined;
  readonly logLevel: z.infer<typeof environment>["TANGENCY_LOG"];
  readonly limits: Limits;
  readonly development: boolean;
}

export interface Limits {
  readonly signInsPerMinute: number;
  readonly uploadsPerHour: number;
  readonly refereeReadsPerMinute: number;
  /** That one address or person may cause. */
  readonly mailsPerHour: number;
}

/** Settings whose value is never printed: it may hold a passphrase. */
const SECRETS: readonly string[] = ["TANGENCY_SECRET", "TANGENCY_SMTP_URL"];

const MOST_THREADS_EACH = 8;

/** Among how many threads one computation is divided: as many as the setting says, or there are processors. */
export function threadsOfOneComputation({ threads }: Pick<Config, "threads">): number {
  return Math.min(threads ?? availableParallelism(), MOST_THREADS_EACH);
}

/** Reads the environment, or throws one sentence that names every variable that will not do. */
export function readConfig(env: Record<string, string | undefined>): Config {
  const given = Object.fromEntries(Object.entries(env).filter(([, value]) => value !== undefined && value !== ""));
  const parsed = environment.safeParse(given);
  if (!parsed.success) {
    const faults = parsed.error.issues.map((issue) => {
      const name = String(issue.path[0]);
      return `${name} ${issue.message}${SECRETS.includes(name) ? "" : `, and is "${given[name]}"`}`;
    });
    throw new Error(`The environment does not fit: ${faults.join("; ")}.`);
  }
  const values = parsed.data;
  const url = (values.TANGENCY_URL ?? `http://localhost:${values.PORT}`).replace(/\/+$/, "");
  return {
    port: values.PORT,
    host: values.TANGENCY_HOST,
    url,
    trustedOrigins: trustedOrigins(values.TANGENCY_URL, values.PORT),
    secure: url.startsWith("https:"),
    dataFolder: values.TANGENCY_DATA,
    demo: values.TANGENCY_DEMO,
    secret: values.TANGENCY_SECRET,
    administrators: values.TANGENCY_ADMINISTRATORS ?? [],
    smtp:
      values.TANGENCY_SMTP_URL === undefined
        ? undefined
        : {
            url: values.TANGENCY_SMTP_URL,
            from: values.TANGENCY_MAIL_FROM ?? `Tangency <tangency@${new URL(url).hostname}>`,
          },
    proxies: values.TANGENCY_PROXIES,
    threads: values.TANGENCY_THREADS,
    logLevel: values.TANGENCY_LOG,
    limits: {
      signInsPerMinute: values.TANGENCY_SIGN_INS_PER_MINUTE,
      uploadsPerHour: values.TANGENCY_UPLOADS_PER_HOUR,
      refereeReadsPerMinute: values.TANGENCY_REFEREE_READS_PER_MINUTE,
      mailsPerHour: values.TANGENCY_MAILS_PER_HOUR,
    },
    development: values.TANGENCY_DEVELOPMENT,
  };
}

/** Pages whose requests are believed: the installation's own address, or this machine's names. */
function trustedOrigins(url: string | undefined, port: number): string[] {
  if (url !== undefined) return [new URL(url).origin];
  return ["localhost", "127.0.0.1", "[::1]"].map((host) => new URL(`http://${host}:${port}`).origin);
}
