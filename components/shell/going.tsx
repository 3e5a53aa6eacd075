"use client";

import { usePathname, useRouter, useSearchParams } from "next/navigation";
import { useEffect, useState } from "react";
import { Working } from "@/components/ui/working";

const NAME_CHARACTERS = 60;

/** Once a link was pressed whose page takes longer than a second: which page is on its way, and a way to stay here. */
export function Going() {
  const router = useRouter();
  const query = useSearchParams().toString();
  const here = `${usePathname()}${query ? `?${query}` : ""}`;
  const [going, setGoing] = useState<{ from: string; name: string } | null>(null);
  useEffect(() => {
    // the router keeps the browser from following its own links, and no others: those the browser tells about itself
    const pressed = (event: MouseEvent) => {
      const link = event.defaultPrevented && event.target instanceof Element ? event.target.closest("a") : null;
      if (!link || link.origin !== window.location.origin || link.pathname + link.search === window.location.pathname + window.location.search) return;
      const name = (link.getAttribute("aria-label") ?? link.textContent ?? "").trim();
      setGoing({ from: window.location.pathname + window.location.search, name: name.length > NAME_CHARACTERS ? `${name.slice(0, NAME_CHARACTERS)}…` : name });
    };
    window.addEventListener("click", pressed);
    return () => window.removeEventListener("click", pressed);
  }, []);
  if (going?.from !== here) return null;
  return <Working key={going.name} framed what={`“${going.name}” is being opened`} stop="Stay here" onStop={() => { setGoing(null); router.replace(here, { scroll: false }); }} />;
}
