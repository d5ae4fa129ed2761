import { Fragment, useSyncExternalStore } from "react";
import { Dialog } from "../components/dialog.tsx";
import { isSingleCharacter, KEYS } from "../lib/keys.ts";
import { letterKeysAct, onPreferencesChange } from "../lib/preferences.ts";
import { LetterKeysWords } from "./letter-keys-words.tsx";

const NAMES: Readonly<Record<string, string>> = {
  ArrowUp: "Up",
  ArrowDown: "Down",
  ArrowLeft: "Left",
  ArrowRight: "Right",
  Escape: "Esc",
};

/** A stroke as the keys are lettered: "Ctrl", "Z". */
function Stroke({ stroke }: { stroke: string }) {
  return stroke.split("+").map((key, index) => (
    <Fragment key={key}>
      {index > 0 && " "}
      <kbd className="key">{NAMES[key] ?? (key.length === 1 ? key.toUpperCase() : key)}</kbd>
    </Fragment>
  ));
}

interface KeysDialogProps {
  /** Whether the person may change the study. */
  readonly readOnly: boolean;
  readonly onClose: () => void;
}

/** Every command of the keyboard with the place where it acts, from the table the handlers ask. */
export default function KeysDialog({ readOnly, onClose }: KeysDialogProps) {
  const letters = useSyncExternalStore(onPreferencesChange, letterKeysAct);
  return (
    <Dialog
      onClose={onClose}
      title="Keys"
      lede="Everything in a study can be done from the keyboard: Tab goes through it in order. On a Mac, Command does for Ctrl."
    >
      <div className="type-small flex flex-wrap items-baseline gap-x-5 pb-2">
        <span className="text-ink2">Keys of a single character</span>
        <LetterKeysWords />
      </div>
      <div className="keys">
        {Object.entries(KEYS).map(([place, { where, commands }]) => (
          <section key={place} aria-label={where} className="keys-place">
            <h3 className="type-section pb-1">{where}</h3>
            <dl>
              {Object.entries(commands)
                .filter(([, command]) => !(readOnly && command.changes))
                .map(([name, { strokes, does }]) => (
                  <div key={name} className="keys-line" data-command={`${place} ${name}`}>
                    <dt>
                      {strokes.map((stroke, index) => (
                        <Fragment key={stroke}>
                          {index > 0 && <span className="text-ink2"> or </span>}
                          <Stroke stroke={stroke} />
                        </Fragment>
                      ))}
                    </dt>
                    <dd>
                      {does}
                      {!letters && strokes.every(isSingleCharacter) && <span className="text-ink2">, turned off</span>}
                    </dd>
                  </div>
                ))}
            </dl>
          </section>
        ))}
      </div>
    </Dialog>
  );
}
