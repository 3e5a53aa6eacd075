"use client";

import Link from "next/link";
import { Icon } from "@/components/ui/icon";
import { Menu } from "@/components/ui/menu";
import { may } from "@/lib/core/policy";
import type { SessionView } from "@/lib/views";

/** The part that ends a session is fetched when somebody asks for it; the server's own page for it stands in where it can't be had. */
async function leave(): Promise<void> {
  try {
    const { signOut } = await import("next-auth/react");
    await signOut({ callbackUrl: "/sign-in" });
  } catch {
    window.location.assign("/api/auth/signout?callbackUrl=/sign-in");
  }
}

export function WhoMenu({ user }: { user: SessionView["user"] }) {
  return (
    <Menu className="at-right" summaryClass="flex items-center gap-2 text-left text-t2 leading-4 text-silk" words={(
      <>
        <span className="slim:sr-only"><b className="block whitespace-nowrap">{user.name}</b><span className="text-t1 text-silk-2">{user.role}</span></span>
        <Icon name="menu" label="Account menu" className="!align-baseline slim:hidden" />
        <span aria-hidden="true" className="hidden h-[34px] min-w-[34px] place-items-center border border-mask-line px-1 font-semibold slim:grid">{user.name.split(" ").map((part) => part[0]).join("").slice(0, 2)}</span>
      </>
    )}>
      <li className="px-3 py-2 text-t2 [overflow-wrap:anywhere] text-silk-2">{user.email}</li>
      <li><Link href="/account">Account</Link></li>
      {may(user, "policy.change") ? null : <li><Link href="/policy">Policy</Link></li>}
      <li><Link href="/help">Help</Link></li>
      <li><button type="button" onClick={() => void leave()}>Sign out</button></li>
    </Menu>
  );
}
