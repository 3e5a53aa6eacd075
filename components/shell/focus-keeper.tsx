"use client";

import { useEffect } from "react";

/** What stands for a control that is gone: the nearest of these around it. */
const PLACES = "[role='dialog'], dialog, form, section, main";

/**
 * A change may take away the control that asked for it, and a page that comes in another's place the link that was
 * followed. Then the nearest part of the page that is still there has the focus, so that Tab goes on from there.
 */
export function FocusKeeper() {
  useEffect(() => {
    /** what has the focus, and all that is around it */
    let trail: Element[] = [];
    function remember() {
      trail = [];
      for (let at = document.activeElement; at && at !== document.body; at = at.parentElement) trail.push(at);
    }
    function look() {
      const [at] = trail;
      if (!at || (at.isConnected && !at.matches(":disabled"))) return;
      if (document.activeElement !== document.body && document.activeElement !== at) return;
      const place = trail.find((one) => one !== at && one.isConnected && one.matches(PLACES)) ?? document.getElementById("main");
      if (!(place instanceof HTMLElement)) return;
      if (!place.hasAttribute("tabindex")) place.tabIndex = -1;
      place.focus({ preventScroll: true });
    }
    const changes = new MutationObserver(look);
    document.addEventListener("focusin", remember);
    changes.observe(document.body, { childList: true, subtree: true, attributeFilter: ["disabled"] });
    return () => {
      document.removeEventListener("focusin", remember);
      changes.disconnect();
    };
  }, []);
  return null;
}
