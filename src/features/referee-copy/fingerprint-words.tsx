import { VerdictFigure } from "../../components/verdict-figure.tsx";
import type { VerificationState } from "./use-verification.ts";

/** The hexadecimal in four lines of two groups. */
export function Fingerprint({ fingerprint }: { fingerprint: string }) {
  const groups = fingerprint.match(/.{8}/g) ?? [];
  return (
    <p className="type-source text-[0.875rem]" aria-label={`Fingerprint ${fingerprint}`} role="img">
      {[0, 2, 4, 6].map((first) => (
        <span key={first} className="block">
          {groups[first]} {groups[first + 1]}
        </span>
      ))}
    </p>
  );
}

/** Whether what was received has the fingerprint it is said to have. */
export function FingerprintVerdict({ result }: { result: VerificationState }) {
  if (result.state !== "done") return null;
  const { fingerprintAgrees, fingerprint } = result.verification;
  return (
    <p className={`type-small flex items-start gap-2 pt-1.5 ${fingerprintAgrees ? "text-ink2" : "text-fail"}`}>
      <VerdictFigure shape={fingerprintAgrees ? "holds" : "breaks"} />
      <span>
        {fingerprintAgrees
          ? "Computed again from what this page received: the same."
          : `What this page received has another: ${fingerprint.slice(0, 16)}…`}
      </span>
    </p>
  );
}
