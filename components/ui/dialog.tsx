"use client";

import type { ReactNode } from "react";
import { whenAsked } from "./when-asked";

const DialogBox = whenAsked(() => import("./dialog-box").then((m) => m.DialogBox));

/** Asks something first. Not for anything that needs the strips in view. Put the buttons last among the children. */
export function Dialog({ open, onOpenChange, ...what }: {
  open: boolean;
  onOpenChange(open: boolean): void;
  title: ReactNode;
  description?: ReactNode;
  children: ReactNode;
}) {
  return open ? <DialogBox {...what} onClose={() => onOpenChange(false)} /> : null;
}
