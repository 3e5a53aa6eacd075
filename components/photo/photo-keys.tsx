"use client";

import { useRouter } from "next/navigation";
import { useEffect } from "react";

/** Left and right go to the photo before and after, as long as the focus is in no field. */
export function PhotoKeys({ prev, next }: { prev: string | null; next: string | null }) {
  const router = useRouter();
  useEffect(() => {
    function onKey(event: KeyboardEvent) {
      if (event.altKey || event.ctrlKey || event.metaKey || event.shiftKey) return;
      if (event.target instanceof Element && event.target.closest("input, textarea, select, [contenteditable], [role=slider], [role=dialog], [role=menu]")) return;
      const to = event.key === "ArrowLeft" ? prev : event.key === "ArrowRight" ? next : null;
      if (to) router.replace(`/photos/${to}`);
    }
    document.addEventListener("keydown", onKey);
    return () => document.removeEventListener("keydown", onKey);
  }, [router, prev, next]);
  return null;
}
