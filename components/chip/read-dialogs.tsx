"use client";

import { whenAsked } from "@/components/ui/when-asked";
import type { ChipView } from "@/lib/views";
import type { AskedOfRead } from "./read-form";

const ReadForm = whenAsked(() => import("./read-form").then((m) => m.ReadForm));

/** Set aside, count again and hand out all ask for a reason first. */
export function ReadDialogs({ asked, ...given }: { asked: AskedOfRead | null; chip: ChipView; onClose(): void; onChanged(): Promise<unknown> }) {
  return asked ? <ReadForm asked={asked} {...given} /> : null;
}
