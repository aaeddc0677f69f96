import type { Config } from "tailwindcss";

const token = (name: string) => `var(--${name})`;
const names = (list: string[]) => Object.fromEntries(list.map((name) => [name, token(name)]));

/** Every token of app/tokens.css under its own name; nothing else has a colour. */
export default {
  content: ["./app/**/*.{ts,tsx}", "./components/**/*.{ts,tsx}"],
  theme: {
    colors: {
      transparent: "transparent",
      current: "currentColor",
      ...names([
        "paper", "sheet", "sunk", "ink", "ink-2", "ink-3", "hair", "rule", "tide", "tide-deep", "tide-wash", "on-tide",
        "brass", "brass-wash", "clay", "clay-wash", "focus", "water", "water-2", "pkg-n", "pkg-n-wash", "pkg-a",
        "pkg-a-wash", "pkg-b", "pkg-b-wash", "pkg-c", "pkg-c-wash", "on-pkg", "sq-rest", "sq-inf", "sq-died",
      ]),
    },
    fontFamily: { sans: "var(--font)" },
    fontSize: {
      12: ["var(--t-12)", "var(--lh-12)"],
      13: ["var(--t-13)", "var(--lh-13)"],
      15: ["var(--t-15)", "var(--lh-15)"],
      17: ["var(--t-17)", "var(--lh-17)"],
      20: ["var(--t-20)", "var(--lh-20)"],
      27: ["var(--t-27)", "var(--lh-27)"],
      38: ["var(--t-38)", "var(--lh-38)"],
    },
    borderRadius: { none: "0", sm: "2px", DEFAULT: "2px", md: "4px", full: "9999px" },
    screens: { sm: "480px", md: "721px", lg: "900px", xl: "1200px", print: { raw: "print" } },
    extend: { maxWidth: { measure: "var(--measure)", page: "var(--page)" } },
  },
} satisfies Config;
