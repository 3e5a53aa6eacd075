import Link from "next/link";
import { buttonClass } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";
import { Menu } from "@/components/ui/menu";
import type { PrintLink } from "./print-words";

/** "Print…" with what can be printed here. */
export function PrintMenu({ links, atRight }: { links: readonly PrintLink[]; atRight?: boolean }) {
  return (
    <Menu className={atRight ? "at-right" : ""} summaryClass={buttonClass({})} words={<><Icon name="print" />Print…</>}>
      {links.map((link) => <li key={link.href}><Link href={link.href}>{link.label}</Link></li>)}
    </Menu>
  );
}
