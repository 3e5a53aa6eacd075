import Link from "next/link";
import { buttonClass } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";
import type { PrintLink } from "./print-words";

/** "Print…" with what can be printed here. Works without a script. */
export function PrintMenu({ links, atRight }: { links: readonly PrintLink[]; atRight?: boolean }) {
  return (
    <details className={`print-menu no-print ${atRight ? "at-right" : ""}`}>
      <summary className={buttonClass({})}><Icon name="print" />Print…</summary>
      <ul>{links.map((link) => <li key={link.href}><Link href={link.href}>{link.label}</Link></li>)}</ul>
    </details>
  );
}
