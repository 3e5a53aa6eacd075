"use client";

import { useCallback, useState } from "react";
import { useLetterKeys, useLetterKeysOn } from "@/components/ui/letter-keys";
import { whenAsked } from "@/components/ui/when-asked";
import type { Tab } from "./tabs";

const KeyList = whenAsked(() => import("./key-list").then((m) => m.KeyList));

/** `?` or the footer opens the list of every key and every page. */
export function KeyHelp({ pages }: { pages: readonly Tab[] }) {
  const [open, setOpen] = useState(false);
  const [on] = useLetterKeysOn();
  useLetterKeys(on, useCallback((letter: string) => {
    if (letter !== "?") return false;
    setOpen(true);
    return true;
  }, []));
  return (
    <>
      <button type="button" className="underline" onClick={() => setOpen(true)}>Keys</button>
      {open ? <KeyList pages={pages} onClose={() => setOpen(false)} /> : null}
    </>
  );
}
