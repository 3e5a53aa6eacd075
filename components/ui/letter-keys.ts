"use client";

import { useEffect, useSyncExternalStore } from "react";

const KEPT_AS = "twinread-letter-keys";
const listeners = new Set<() => void>();

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

/** Single-letter keys can be switched off, for who speaks to the browser; this browser remembers it. */
export function useLetterKeysOn(): [boolean, (on: boolean) => void] {
  const on = useSyncExternalStore(subscribe, () => localStorage.getItem(KEPT_AS) !== "off", () => true);
  return [on, (next) => {
    localStorage.setItem(KEPT_AS, next ? "on" : "off");
    for (const listener of listeners) listener();
  }];
}

const TYPING = /^(INPUT|TEXTAREA|SELECT)$/;

/** Letters pressed on the page while nobody is typing. A part that has taken the key already keeps it. */
export function useLetterKeys(on: boolean, act: (letter: string) => boolean): void {
  useEffect(() => {
    if (!on) return;
    function onKey(event: KeyboardEvent) {
      const at = event.target as HTMLElement;
      if (event.defaultPrevented || event.ctrlKey || event.metaKey || event.altKey) return;
      if (TYPING.test(at.tagName) && !(at instanceof HTMLInputElement && at.type === "checkbox")) return;
      if (act(event.key.toLowerCase())) event.preventDefault();
    }
    document.addEventListener("keydown", onKey);
    return () => document.removeEventListener("keydown", onKey);
  }, [on, act]);
}
