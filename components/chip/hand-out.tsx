"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";
import { Note } from "@/components/ui/note";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import { Working } from "@/components/ui/working";
import { comeText } from "@/lib/core/quantity";
import type { Format } from "@/lib/core/words";
import { save } from "@/lib/http/send";
import { FormatChoice } from "./format-choice";

/** Saves an image that may leave the house without a reason: the approved one, or the donor's own content. */
export function HandOut({ readId, children, lead = false }: { readId: string; children: string; lead?: boolean }) {
  const say = useSay();
  const [format, setFormat] = useState<Format>("raw");
  const { refusal, busy, attempt, stop } = useChange();
  const [far, setFar] = useState<string | null>(null);
  const download = () => attempt(async (signal) => {
    setFar(null);
    const file = await save(`/api/reads/${readId}/download`, { format }, { signal, onBytes: (come, of) => setFar(comeText(come, of)) });
    say({ text: `Saved as ${file}. The hand-out is in the log.` });
  });
  return (
    <>
      <span className="inline-flex flex-wrap items-start gap-x-2 gap-y-1.5">
        <Button variant={lead ? "lead" : "plain"} disabled={busy} onClick={() => void download()}><Icon name="down" />{children}</Button>
        <FormatChoice quiet label={`Format of ${children}`} value={format} onChoose={setFormat} />
      </span>
      {busy ? <Working what={far ? "The file is coming" : "The stored image is read and checked first"} far={far} onStop={stop} /> : null}
      {refusal ? <Note kind="block" role="alert" title="Nothing was handed out." className="basis-full">{refusal}</Note> : null}
    </>
  );
}
