import { Dialog } from "../components/dialog.tsx";
import { LetterKeysWords } from "./letter-keys-words.tsx";
import { ThemeWords } from "./theme-words.tsx";

/** What is chosen for this machine. */
export default function SettingsDialog({ onClose }: { onClose: () => void }) {
  return (
    <Dialog onClose={onClose} title="Settings" lede="Kept on this machine.">
      <div className="grid grid-cols-[auto_1fr] items-baseline gap-x-8 gap-y-4">
        <span className="text-ink2">Theme</span>
        <ThemeWords />
        <span className="text-ink2">Single-letter keys</span>
        <LetterKeysWords />
      </div>
      <p className="type-small pt-6 text-ink2">
        Which keys there are stands under <i>Keys</i> in a study, or behind the key ?.
      </p>
    </Dialog>
  );
}
