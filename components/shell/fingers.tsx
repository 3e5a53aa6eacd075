"use client";

import Link from "next/link";
import { useEffect, useRef } from "react";
import type { Tab, TabKey } from "./tabs";

/** The contact fingers. On a phone they slide sideways: where you are is brought into view. */
export function Fingers({ tabs, current, benchCount }: { tabs: readonly Tab[]; current: TabKey | null; benchCount: number }) {
  const nav = useRef<HTMLElement>(null);
  useEffect(() => {
    const here = nav.current?.querySelector<HTMLElement>("[aria-current]");
    if (nav.current && here) nav.current.scrollLeft = here.offsetLeft + here.offsetWidth / 2 - nav.current.clientWidth / 2;
  }, [current]);
  return (
    <nav ref={nav} aria-label="Main" className="phone:relative phone:order-first phone:-mx-4 phone:w-[calc(100%+32px)] phone:overflow-x-auto phone:px-4 phone:[scrollbar-width:none]">
      <ul className="fingers flex h-full gap-1">
        {tabs.map((tab) => (
          <li key={tab.key}>
            <Link href={tab.href} aria-current={tab.key === current ? "page" : undefined}>
              {tab.label}
              {tab.key === "bench" && benchCount > 0 ? <span className="ml-[7px] font-mono !text-t1 font-medium">{benchCount}<span className="sr-only"> {benchCount === 1 ? "chip" : "chips"}</span></span> : null}
            </Link>
          </li>
        ))}
      </ul>
    </nav>
  );
}
