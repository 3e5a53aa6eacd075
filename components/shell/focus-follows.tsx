"use client";

import { usePathname } from "next/navigation";
import { useEffect, useRef } from "react";

/** A page that comes in another's place takes along the link that was followed: then the page has the focus, not nothing. */
export function FocusFollows() {
  const pathname = usePathname();
  const before = useRef(pathname);
  useEffect(() => {
    if (before.current === pathname) return;
    before.current = pathname;
    if (document.activeElement === document.body) document.getElementById("main")?.focus({ preventScroll: true });
  }, [pathname]);
  return null;
}
