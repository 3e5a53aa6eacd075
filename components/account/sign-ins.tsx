"use client";

import { signOut } from "next-auth/react";
import { useState } from "react";
import { Button, Buttons } from "@/components/ui/button";
import { Note } from "@/components/ui/note";
import { useSay } from "@/components/ui/toast";
import { countOf } from "@/lib/core/quantity";
import { Refusal, send } from "@/lib/http/send";

/** `canEndOthers` is false for who still has a one-time password: that opens nothing but choosing another. */
export function SignIns({ canEndOthers }: { canEndOthers: boolean }) {
  const say = useSay();
  const [refusal, setRefusal] = useState<string | null>(null);
  const [busy, setBusy] = useState(false);
  async function endOthers() {
    setBusy(true);
    setRefusal(null);
    try {
      const { ended } = await send<{ ended: number }>("POST", "/api/account/sessions/end");
      say({ text: ended === 0 ? "There was no other sign-in." : `${countOf(ended, "other sign-in")} ended.` });
    } catch (error) {
      if (!(error instanceof Refusal)) throw error;
      setRefusal(error.detail);
    } finally {
      setBusy(false);
    }
  }
  return (
    <div className="grid gap-3.5">
      {refusal ? <Note kind="block" role="alert" title="Nothing was ended.">{refusal}</Note> : null}
      <Buttons>
        {canEndOthers ? <Button disabled={busy} onClick={() => void endOthers()}>End my other sign-ins</Button> : null}
        <Button onClick={() => void signOut({ callbackUrl: "/sign-in" })}>Sign out</Button>
      </Buttons>
    </div>
  );
}
