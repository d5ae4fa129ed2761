/** Days and moments as a CSV would write them, so that they sort, and so that a column of them can be the time. */

const DAY_SECONDS = 86_400n;
/** The years that four digits hold. */
const FIRST_DAY = -719_528;
const LAST_DAY = 2_932_896;

/** 2029-03-14, of days since 1970-01-01. A day outside the years 0 to 9999 has no such text and throws. */
export function dayText(days: number): string {
  if (!(days >= FIRST_DAY && days <= LAST_DAY)) throw new RangeError(`day ${days} is outside the years 0 to 9999`);
  return new Date(days * 86_400_000).toISOString().slice(0, 10);
}

/** 2029-03-14T09:30:00, with the parts of a second where there are any; midnight is the day alone. */
export function momentText(ticks: bigint, perSecond: bigint): string {
  const seconds = floorDivide(ticks, perSecond);
  const days = floorDivide(seconds, DAY_SECONDS);
  const day = dayText(Number(days));
  const within = Number(seconds - days * DAY_SECONDS);
  const part = ticks - seconds * perSecond;
  if (within === 0 && part === 0n) return day;
  const clock = [Math.floor(within / 3600), Math.floor(within / 60) % 60, within % 60];
  const digits = String(perSecond).length - 1;
  const fraction = part === 0n ? "" : `.${String(part).padStart(digits, "0").replace(/0+$/, "")}`;
  return `${day}T${clock.map((number) => String(number).padStart(2, "0")).join(":")}${fraction}`;
}

function floorDivide(a: bigint, b: bigint): bigint {
  const quotient = a / b;
  return a % b < 0n ? quotient - 1n : quotient;
}
