import type { Config } from "tailwindcss";

const token = (name: string) => `var(--${name})`;
const NAMES = [
  "paper",
  "verso",
  "recto",
  "rule",
  "rule2",
  "ctl",
  "line",
  "ink",
  "ink2",
  "ink3",
  "accent",
  "accent-2",
  "accent-ink",
  "accent-wash",
  "stale",
  "stale-wash",
  "fail",
  "fail-wash",
  "who-a",
  "who-b",
  "who-c",
  "who-d",
  "n5",
  "n4",
  "n3",
  "n2",
  "n1",
  "z0",
  "p1",
  "p2",
  "p3",
  "p4",
  "p5",
  "s1",
  "s2",
  "s3",
  "s4",
  "s5",
  "s6",
];

/** Colours are the custom properties of src/styles and nothing else: the palette lives once. */
export default {
  content: ["./index.html", "./src/**/*.{ts,tsx}"],
  theme: {
    colors: {
      transparent: "transparent",
      current: "currentColor",
      ...Object.fromEntries(NAMES.map((name) => [name, token(name)])),
    },
    fontFamily: {
      serif: ["Literata Variable", "Tangency Math", "serif"],
      sans: ["Source Sans 3 Variable", "Tangency Math", "sans-serif"],
      mono: ["Source Code Pro Variable", "Tangency Math", "monospace"],
    },
    borderRadius: { none: "0", control: "3px" },
    extend: {},
  },
} satisfies Config;
