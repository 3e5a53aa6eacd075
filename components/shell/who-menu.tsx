"use client";

import Link from "next/link";
import { signOut } from "next-auth/react";
import { DropdownMenu } from "radix-ui";
import { Icon } from "@/components/ui/icon";
import { may } from "@/lib/core/policy";
import type { SessionView } from "@/lib/views";

const ITEM = "block w-full cursor-pointer px-3.5 py-2 text-left font-semibold text-ink no-underline data-[highlighted]:bg-well data-[highlighted]:outline-none";

export function WhoMenu({ user }: { user: SessionView["user"] }) {
  return (
    <DropdownMenu.Root modal={false}>
      <DropdownMenu.Trigger className="flex items-center gap-2 text-left text-t2 leading-4 text-silk">
        <span className="slim:sr-only"><b className="block whitespace-nowrap">{user.name}</b><span className="text-t1 text-silk-2">{user.role}</span></span>
        <Icon name="menu" label="Account menu" className="!align-baseline slim:hidden" />
        <span aria-hidden="true" className="hidden h-[34px] min-w-[34px] place-items-center border border-mask-line px-1 font-semibold slim:grid">{user.name.split(" ").map((part) => part[0]).join("").slice(0, 2)}</span>
      </DropdownMenu.Trigger>
      <DropdownMenu.Portal>
        <DropdownMenu.Content align="end" sideOffset={6} className="z-50 min-w-44 border border-rule-2 bg-sheet py-1 text-t3 text-ink">
          <DropdownMenu.Label className="px-3.5 py-2 text-t2 text-ink-2">{user.email}</DropdownMenu.Label>
          <DropdownMenu.Item asChild><Link href="/account" className={ITEM}>Account</Link></DropdownMenu.Item>
          {may(user, "policy.change") ? null : <DropdownMenu.Item asChild><Link href="/policy" className={ITEM}>Policy</Link></DropdownMenu.Item>}
          <DropdownMenu.Item asChild><Link href="/help" className={ITEM}>Help</Link></DropdownMenu.Item>
          <DropdownMenu.Item className={ITEM} onSelect={() => void signOut({ callbackUrl: "/sign-in" })}>Sign out</DropdownMenu.Item>
        </DropdownMenu.Content>
      </DropdownMenu.Portal>
    </DropdownMenu.Root>
  );
}
