"use client";

import { Icon } from "@/components/ui/icon";

const YEAR_SECONDS = 365 * 24 * 3600;

/** Day bench or night bench: overrules the system's choice, and is remembered in the cookie `theme`. */
export function ThemeFlip() {
  function flip() {
    const root = document.documentElement;
    const night = root.dataset.theme ? root.dataset.theme === "night" : matchMedia("(prefers-color-scheme: dark)").matches;
    const next = night ? "day" : "night";
    root.dataset.theme = next;
    document.cookie = `theme=${next}; path=/; max-age=${YEAR_SECONDS}; samesite=lax`;
  }
  return (
    <button type="button" onClick={flip} title="Day or night bench" aria-label="Switch between day bench and night bench" className="grid h-[34px] w-[34px] flex-none place-items-center border border-mask-line text-silk hover:border-silk-2">
      <Icon name="lamp" className="!align-baseline" />
    </button>
  );
}
