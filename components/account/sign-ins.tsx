"use client";

import { signOut } from "next-auth/react";
import { Button, Buttons } from "@/components/ui/button";
import { Note } from "@/components/ui/note";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import { countOf } from "@/lib/core/quantity";
import { send } from "@/lib/http/send";

/** `canEndOthers` is false for who still has a one-time password: that opens nothing but choosing another. */
export function SignIns({ canEndOthers }: { canEndOthers: boolean }) {
  const say = useSay();
  const { refusal, busy, attempt } = useChange();
  const endOthers = () => attempt(async () => {
    const { ended } = await send<{ ended: number }>("POST", "/api/account/sessions/end");
    say({ text: ended === 0 ? "There was no other sign-in." : `${countOf(ended, "other sign-in")} ended.` });
  });
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
