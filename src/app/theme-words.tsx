import { useSyncExternalStore } from "react";
import { SwitchWords } from "../components/switch-words.tsx";
import { chooseTheme, onThemeChange, themeChoice } from "../lib/theme.ts";

const WORDS = [
  { value: "system", word: "As the system" },
  { value: "light", word: "Light" },
  { value: "dark", word: "Dark" },
] as const;

export function useThemeChoice() {
  return useSyncExternalStore(onThemeChange, themeChoice);
}

export function ThemeWords() {
  return <SwitchWords label="Theme" words={WORDS} value={useThemeChoice()} onChange={chooseTheme} />;
}
