import { useEffect, useState } from "react";
import type { Progress } from "../../../shared/schemas/status.ts";

/** Progress with its clock running on between one message and the next. */
export function useRunning(progress: Progress): Progress {
  const [now, setNow] = useState(() => performance.now());
  const [told, setTold] = useState({ progress, at: now });
  if (told.progress !== progress) setTold({ progress, at: performance.now() });
  useEffect(() => {
    const timer = setInterval(() => setNow(performance.now()), 250);
    return () => clearInterval(timer);
  }, []);
  return { ...progress, elapsedMs: progress.elapsedMs + Math.max(0, now - told.at) };
}
