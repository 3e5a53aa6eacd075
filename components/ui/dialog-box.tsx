"use client";

import { Dialog as Radix } from "radix-ui";
import { useRef, type ReactNode } from "react";
import { Icon } from "./icon";

/** What a dialog stands in. It is open as long as it is mounted; dialog.tsx fetches it when one is. */
export function DialogBox({ onClose, title, description, children }: {
  onClose(): void;
  title: ReactNode;
  description?: ReactNode;
  children: ReactNode;
}) {
  const before = useRef<Element | null>(null);
  // what opened it isn't always a Radix trigger: the focus goes back to where it was, or to the page when that is gone
  function start(event: Event) {
    before.current = document.activeElement;
    const field = event.currentTarget instanceof HTMLElement ? event.currentTarget.querySelector<HTMLElement>("input, select, textarea") : null;
    if (!field) return;
    event.preventDefault();
    field.focus();
  }
  function back(event: Event) {
    event.preventDefault();
    const target = before.current?.isConnected ? before.current : document.getElementById("main");
    if (target instanceof HTMLElement) target.focus({ preventScroll: true });
  }
  return (
    <Radix.Root open onOpenChange={(next) => { if (!next) onClose(); }}>
      <Radix.Portal>
        <Radix.Overlay className="fixed inset-0 z-40 bg-[color-mix(in_srgb,var(--mask-deep)_62%,transparent)]" />
        <Radix.Content
          {...(description ? {} : { "aria-describedby": undefined })}
          onOpenAutoFocus={start}
          onCloseAutoFocus={back}
          className="fixed top-1/2 left-1/2 z-50 grid max-h-[92vh] w-[min(560px,calc(100vw-24px))] -translate-x-1/2 -translate-y-1/2 gap-4 overflow-y-auto border border-rule-2 border-t-4 border-t-mask bg-paper px-6 pt-5 pb-6 text-t3 text-ink phone:px-4"
        >
          <div className="flex items-start justify-between gap-4">
            <Radix.Title className="text-t5 font-bold">{title}</Radix.Title>
            <Radix.Close aria-label="Close" className="grid h-8 w-8 flex-none place-items-center border border-rule-2 bg-sheet hover:border-ink"><Icon name="close" /></Radix.Close>
          </div>
          {description ? <Radix.Description asChild><div className="-mt-2 text-ink-2">{description}</div></Radix.Description> : null}
          {children}
        </Radix.Content>
      </Radix.Portal>
    </Radix.Root>
  );
}
