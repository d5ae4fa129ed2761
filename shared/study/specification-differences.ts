import type { SystemSpecification } from "../schemas/system.ts";
import { canonicalJson } from "./canonical-json.ts";
import { normaliseSpecification } from "./normalise.ts";
import { VOCABULARY } from "./vocabulary.ts";

/** A key of two specifications side by side, in words; absent where a side does not give it and nothing holds by default. */
export interface KeyBesideKey {
  readonly key: string;
  readonly left?: string;
  readonly right?: string;
  readonly isSame: boolean;
}

/** Every key either of two system cells gives or takes by default, in the order of the vocabulary. */
export function besideEachOther(left: SystemSpecification, right: SystemSpecification): KeyBesideKey[] {
  const [a, b] = [left, right].map((one) => normaliseSpecification(one) as unknown as Record<string, unknown>);
  return VOCABULARY.system.flatMap(({ key }) => {
    if (a[key] === undefined && b[key] === undefined) return [];
    return [
      {
        key,
        ...(a[key] !== undefined && { left: valueInWords(a[key]) }),
        ...(b[key] !== undefined && { right: valueInWords(b[key]) }),
        isSame: a[key] !== undefined && b[key] !== undefined && canonicalJson(a[key]) === canonicalJson(b[key]),
      },
    ];
  });
}

/** A value as a person would read it aloud: "homogeneity, symmetry"; "cluster: village"; "none" for an empty list. */
function valueInWords(value: unknown): string {
  if (Array.isArray(value)) return value.length === 0 ? "none" : value.map(valueInWords).join(", ");
  if (typeof value === "boolean") return value ? "yes" : "no";
  if (typeof value !== "object" || value === null) return String(value);
  return Object.entries(value)
    .map(([key, inner]) => `${key}: ${valueInWords(inner)}`)
    .join("; ");
}
