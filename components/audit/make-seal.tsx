"use client";

import { useRouter } from "next/navigation";
import { Button } from "@/components/ui/button";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import { Working } from "@/components/ui/working";
import { send } from "@/lib/http/send";

/** Seals where every log stands now, and mails it to the auditors. */
export function MakeSeal() {
  const router = useRouter();
  const say = useSay();
  const { refusal, busy, attempt } = useChange();
  const make = () => attempt(async () => {
    const { number } = await send<{ number: number }>("POST", "/api/seals");
    say({ text: `Seal ${number} is made and goes to the auditors by mail.` });
    router.refresh();
  });
  return (
    <span className="inline-grid gap-2">
      <Button variant="lead" disabled={busy} reason={refusal} onClick={() => void make()}>{busy ? "Making a seal" : "Make a seal now"}</Button>
      {busy ? <Working what="The heads of all logs are gathered and signed" note="A seal is made as a whole or not at all, so it can’t be stopped half-way." /> : null}
    </span>
  );
}
