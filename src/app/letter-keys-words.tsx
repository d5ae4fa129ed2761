import { useSyncExternalStore } from "react";
import { SwitchWords } from "../components/switch-words.tsx";
import { chooseLetterKeys, letterKeysAct, onPreferencesChange } from "../lib/preferences.ts";

const ON_OFF = [
  { value: "on", word: "On" },
  { value: "off", word: "Off" },
] as const;

/** Whether keys of a single character act on this machine. */
export function LetterKeysWords() {
  const letters = useSyncExternalStore(onPreferencesChange, letterKeysAct);
  return (
    <SwitchWords
      label="Single-letter keys"
      words={ON_OFF}
      value={letters ? "on" : "off"}
      onChange={(value) => chooseLetterKeys(value === "on")}
    />
  );
}
