"use client";

import { type KeyboardEvent, type MouseEvent, type ReactNode, useEffect, useRef } from "react";

/** A list of ways that opens below its button; each child is an `<li>`. Links in it work without a script. A choice, Escape or anything done elsewhere closes it. */
export function Menu({ words, summaryClass = "", className = "", children }: { words: ReactNode; summaryClass?: string; className?: string; children: ReactNode }) {
  const box = useRef<HTMLDetailsElement>(null);
  useEffect(() => {
    function elsewhere(event: Event) {
      if (box.current?.open && event.target instanceof Node && !box.current.contains(event.target)) box.current.open = false;
    }
    document.addEventListener("pointerdown", elsewhere);
    document.addEventListener("focusin", elsewhere);
    return () => {
      document.removeEventListener("pointerdown", elsewhere);
      document.removeEventListener("focusin", elsewhere);
    };
  }, []);
  function onKeyDown(event: KeyboardEvent<HTMLDetailsElement>) {
    if (event.key !== "Escape" || !event.currentTarget.open) return;
    event.currentTarget.open = false;
    event.currentTarget.querySelector("summary")?.focus();
  }
  function onClick(event: MouseEvent<HTMLDetailsElement>) {
    if (event.target instanceof Element && event.target.closest("li a, li button")) event.currentTarget.open = false;
  }
  return (
    <details ref={box} className={`menu no-print ${className}`} onKeyDown={onKeyDown} onClick={onClick}>
      <summary className={summaryClass}>{words}</summary>
      <ul>{children}</ul>
    </details>
  );
}
