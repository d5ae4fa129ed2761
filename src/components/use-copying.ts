import { useState } from "react";

/** Puts something on the clipboard, and the word for how that went. */
export function useCopying() {
  const [said, setSaid] = useState<string>();
  const copy = async (write: () => Promise<void>) => {
    try {
      await write();
      setSaid("Copied");
    } catch {
      setSaid("The browser does not let this page copy");
    }
  };
  return { said, copy };
}
