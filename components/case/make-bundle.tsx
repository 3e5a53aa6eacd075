"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";
import { Note } from "@/components/ui/note";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import { Working } from "@/components/ui/working";
import { comeText } from "@/lib/core/quantity";
import { save } from "@/lib/http/send";

/** Makes the case bundle and saves it. What leaves the house is recorded before its first byte leaves. */
export function MakeBundle({ caseId }: { caseId: string }) {
  const say = useSay();
  const { refusal, busy, attempt, stop } = useChange();
  const [far, setFar] = useState<string | null>(null);
  async function make() {
    let name = "";
    setFar(null);
    if (await attempt(async (signal) => { name = await save(`/api/cases/${caseId}/bundle`, undefined, { signal, onBytes: (come, of) => setFar(comeText(come, of)) }); })) say({ text: `Saved ${name}. Both ends of the making are in the log.` });
  }
  return (
    <span className="inline-grid justify-items-end gap-2">
      <Button disabled={busy} onClick={() => void make()}><Icon name="down" />{busy ? "Making the bundle" : "Case bundle"}</Button>
      {busy ? <Working what={far ? "The bundle is coming" : "Every stored image of the case is read and checked first"} far={far} onStop={stop} /> : null}
      {refusal ? <Note kind="block" role="alert" title="There is no bundle." className="max-w-[360px] text-left">{refusal}</Note> : null}
    </span>
  );
}
