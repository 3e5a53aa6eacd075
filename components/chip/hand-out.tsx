"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";
import { Note } from "@/components/ui/note";
import { useSay } from "@/components/ui/toast";
import { Refusal, save } from "@/lib/http/send";

/** Saves an image that may leave the house without a reason: the approved one, or the donor's own content. */
export function HandOut({ readId, children, lead = false }: { readId: string; children: string; lead?: boolean }) {
  const say = useSay();
  const [busy, setBusy] = useState(false);
  const [refusal, setRefusal] = useState<string | null>(null);
  async function download() {
    setBusy(true);
    setRefusal(null);
    try {
      const file = await save(`/api/reads/${readId}/download`, {});
      say({ text: `Saved as ${file}. The hand-out is in the log.` });
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      setRefusal(error.detail);
    } finally {
      setBusy(false);
    }
  }
  return (
    <>
      <Button variant={lead ? "lead" : "plain"} disabled={busy} onClick={() => void download()}><Icon name="down" />{children}</Button>
      {refusal ? <Note kind="block" role="alert" title="Nothing was handed out." className="basis-full">{refusal}</Note> : null}
    </>
  );
}
