import { lazy, Suspense, useState } from "react";
import { commandOf } from "../lib/keys.ts";
import type { Asked, MenuProps } from "./menu-entries.ts";

const load = () => import("./opened-menu.tsx");
const OpenedMenu = lazy(load);
const expect = () => void load().catch(() => {});

/** A list of words that opens from a word. The list is loaded when it is first asked for; the word is there at once. */
export function Menu(props: MenuProps) {
  const { trigger, className = "word", label } = props;
  const [asked, setAsked] = useState<Asked>();
  const word = (
    <button
      type="button"
      className={className}
      aria-label={label}
      aria-haspopup="menu"
      aria-expanded={asked !== undefined}
      onPointerEnter={expect}
      onFocus={expect}
      onClick={({ detail }) => setAsked(detail === 0 ? "keyboard" : "pointer")}
      onKeyDown={(event) => {
        if (commandOf("menu", event) !== "open") return;
        event.preventDefault();
        setAsked("keyboard");
      }}
    >
      {trigger}
    </button>
  );
  return asked ? (
    <Suspense fallback={word}>
      <OpenedMenu {...props} asked={asked} />
    </Suspense>
  ) : (
    word
  );
}
