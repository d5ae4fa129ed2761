import { useCallback, useEffect, useRef, useState } from "react";
import type { RefereeCopy } from "../../../shared/schemas/referee-copy.ts";
import { createEconomicsWorker, type EconomicsWorker } from "../../workers/client.ts";
import type { Verification } from "../../workers/verify-copy.ts";

/** How a copy is verified; tests answer without a worker. */
export type Verify = (copy: RefereeCopy) => Promise<Verification>;

export type VerificationState =
  | { readonly state: "computing" }
  | { readonly state: "done"; readonly verification: Verification }
  | { readonly state: "failed"; readonly reason: string };

/** Recomputes the copy when the page opens, and again when asked. */
export function useVerification(copy: RefereeCopy, verify?: Verify) {
  const [result, setResult] = useState<VerificationState>({ state: "computing" });
  const worker = useRef<EconomicsWorker | undefined>(undefined);
  const runs = useRef(0);
  const again = useCallback(async () => {
    const run = ++runs.current;
    // An answer to an earlier question must not stand for a later one.
    const settle = (next: VerificationState) => run === runs.current && setResult(next);
    settle({ state: "computing" });
    try {
      if (!verify) worker.current ??= createEconomicsWorker();
      const verification = await (verify ? verify(copy) : worker.current!.ask("verification", copy));
      settle({ state: "done", verification });
    } catch (error) {
      settle({ state: "failed", reason: error instanceof Error ? error.message : String(error) });
    }
  }, [copy, verify]);
  useEffect(() => {
    void again();
    return () => {
      worker.current?.close();
      worker.current = undefined;
    };
  }, [again]);
  return { result, again };
}
