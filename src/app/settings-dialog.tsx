import { useSyncExternalStore } from "react";
import { Dialog } from "../components/dialog.tsx";
import { SwitchWords } from "../components/switch-words.tsx";
import { chooseLetterKeys, letterKeysAct, onPreferencesChange } from "../lib/preferences.ts";
import { ThemeWords } from "./theme-words.tsx";

const ON_OFF = [
  { value: "on", word: "On" },
  { value: "off", word: "Off" },
] as const;

const KEYS: readonly (readonly [keys: string, does: string])[] = [
  ["J, K", "the next cell, the one before"],
  ["Enter", "opens the cell in full"],
  ["T", "swaps form and text"],
  ["Escape", "from a field back to its cell, from an opened cell back to the study"],
  ["Arrows", "from cell to cell while the thread has the focus; entry to entry in a matrix"],
];

/** What is chosen for this machine. */
export default function SettingsDialog({ onClose }: { onClose: () => void }) {
  const letters = useSyncExternalStore(onPreferencesChange, letterKeysAct);
  return (
    <Dialog onClose={onClose} title="Settings" lede="Kept on this machine.">
      <div className="grid grid-cols-[auto_1fr] items-baseline gap-x-8 gap-y-4">
        <span className="text-ink2">Theme</span>
        <ThemeWords />
        <span className="text-ink2">Single-letter keys</span>
        <SwitchWords
          label="Single-letter keys"
          words={ON_OFF}
          value={letters ? "on" : "off"}
          onChange={(value) => chooseLetterKeys(value === "on")}
        />
      </div>
      <h3 className="type-section pt-7 pb-2">Keys of the study page</h3>
      <dl className="grid grid-cols-[auto_1fr] gap-x-8 gap-y-1.5">
        {KEYS.map(([keys, does]) => (
          <div key={keys} className="contents">
            <dt className="font-semibold">{keys}</dt>
            <dd className="text-ink2">{does}</dd>
          </div>
        ))}
      </dl>
    </Dialog>
  );
}
