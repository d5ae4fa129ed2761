/**
 * How dates, times and the interface's own numbers are written: as the browser says, or as its person chose on this
 * machine. Words stay English, so only the order of a date, the clock and the signs in numbers follow. What findings
 * print, and all that is copied, sealed or saved, keeps the decimal point everywhere: shared/tables/numbers.ts.
 */

/** What can be chosen instead of following the browser, by the place whose custom it is. */
export const PLACES = [
  { locale: "en-GB", place: "Britain" },
  { locale: "en-US", place: "the United States" },
  { locale: "de-DE", place: "Germany" },
  { locale: "fr-FR", place: "France" },
  { locale: "de-CH", place: "Switzerland" },
  { locale: "en-IN", place: "India" },
] as const;

const KEY = "tangency-formats";
const listeners = new Set<() => void>();
let chosen: string | undefined;

/** A locale of `PLACES`; empty where the browser is followed. */
export function formatChoice(): string {
  if (chosen !== undefined) return chosen;
  let kept: string | null = null;
  try {
    kept = localStorage.getItem(KEY);
  } catch {
    // Nothing is kept here: the browser is followed.
  }
  chosen = PLACES.some(({ locale }) => locale === kept) ? (kept ?? "") : "";
  return chosen;
}

export function chooseFormats(locale: string): void {
  chosen = locale;
  try {
    if (locale === "") localStorage.removeItem(KEY);
    else localStorage.setItem(KEY, locale);
  } catch {
    // Kept for this page only, then.
  }
  for (const listener of listeners) listener();
}

export function onFormatsChange(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

interface Formats {
  /** "March 9" rather than "9 March". */
  readonly monthFirst: boolean;
  /** "2:08 PM" rather than "14:08". */
  readonly halfDays: boolean;
  readonly number: (value: number, decimals: number) => string;
}

const known = new Map<string, Formats>();

function formatsNow(): Formats {
  const wanted = formatChoice() || (typeof navigator === "undefined" ? "en-GB" : navigator.language);
  const formats = known.get(wanted) ?? formatsOf(wanted);
  known.set(wanted, formats);
  return formats;
}

function formatsOf(wanted: string): Formats {
  const locale = isLocale(wanted) ? wanted : "en-GB";
  const parts = new Intl.DateTimeFormat(locale, { day: "numeric", month: "long" }).formatToParts(new Date(2031, 2, 9));
  const place = (type: string) => parts.findIndex((part) => part.type === type);
  // Where a date begins with its year its month comes before its day too; in English words that is day and month.
  const full = new Intl.DateTimeFormat(locale, { dateStyle: "long" }).formatToParts(new Date(2031, 2, 9));
  const yearFirst = full.findIndex(({ type }) => type === "year") < full.findIndex(({ type }) => type === "month");
  return {
    monthFirst: place("month") < place("day") && !yearFirst,
    halfDays: new Intl.DateTimeFormat(locale, { hour: "numeric" }).resolvedOptions().hour12 === true,
    number: (value, decimals) => printNumber(locale, value, decimals),
  };
}

/**
 * Digits of the locale, with one departure: where thousands are parted by a point a narrow space stands, as the
 * standards of such places allow. "4.812" beside a finding's decimal points would read as less than five.
 */
function printNumber(locale: string, value: number, decimals: number): string {
  const format = new Intl.NumberFormat(locale, {
    numberingSystem: "latn",
    minimumFractionDigits: decimals,
    maximumFractionDigits: decimals,
  });
  return format
    .formatToParts(value)
    .map(({ type, value: part }) => {
      if (type === "group" && part === ".") return "\u202f";
      return type === "minusSign" ? "\u2212" : part;
    })
    .join("");
}

function isLocale(name: string): boolean {
  try {
    return Intl.getCanonicalLocales(name).length > 0;
  } catch {
    return false;
  }
}

/** "14:08", "9:05"; "2:08 PM" where the day is counted in halves. */
export function writeClock(date: Date): string {
  const minutes = String(date.getMinutes()).padStart(2, "0");
  const hours = date.getHours();
  if (!formatsNow().halfDays) return `${hours}:${minutes}`;
  return `${hours % 12 || 12}:${minutes} ${hours < 12 ? "AM" : "PM"}`;
}

/** "9 March" or "March 9", with the year where it is wanted. */
export function writeDate(date: Date, withYear: boolean): string {
  const month = date.toLocaleDateString("en-GB", { month: "long" });
  const [day, year] = [date.getDate(), date.getFullYear()];
  if (formatsNow().monthFirst) return withYear ? `${month} ${day}, ${year}` : `${month} ${day}`;
  return withYear ? `${day} ${month} ${year}` : `${day} ${month}`;
}

/** A number of the interface, which is no finding: "4,938", "4 938", "1,6". */
export function writeNumber(value: number, decimals = 0): string {
  return formatsNow().number(value, decimals);
}

/** How many of something the interface counts: "4,938 rows", "one row" is for sentences of findings. */
export function writeCount(count: number, thing: string): string {
  return `${writeNumber(count)} ${thing}${count === 1 ? "" : "s"}`;
}

/** "30 %", the sign after a thin space. */
export function writePercent(fraction: number): string {
  return `${writeNumber(Math.floor(fraction * 100))}\u2009%`;
}
