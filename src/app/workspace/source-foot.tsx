import { addressOf } from "./addresses.ts";
import type { Standing } from "./standing.ts";

const inFours = (fingerprint: string) => (fingerprint.slice(0, 16).match(/.{4}/g) ?? []).join(" ");

interface SourceFootProps {
  readonly standing: Standing;
  /** The id of a cell by its name. */
  readonly idOf: (name: string) => string | undefined;
}

/** What uses the cell, and the first digits of the fingerprint its finding is stored under. */
export function SourceFoot({ standing: { readBy, fingerprint }, idOf }: SourceFootProps) {
  if (readBy.length === 0 && !fingerprint) return null;
  return (
    <div className="type-smallest mt-5 border-rule2 border-t pt-2.5 text-ink2">
      {readBy.length > 0 && (
        <p>
          Used by{" "}
          {readBy.map((name, index) => (
            <span key={name}>
              {index > 0 && (index === readBy.length - 1 ? " and " : ", ")}
              <a className="reference" href={addressOf(idOf(name) ?? "")}>
                {name}
              </a>
            </span>
          ))}
          .
        </p>
      )}
      {fingerprint && (
        <p>
          Fingerprint <span className="type-source text-[0.78125rem]">{inFours(fingerprint)}</span>
        </p>
      )}
    </div>
  );
}
