"use client";

import { useRouter } from "next/navigation";
import { Button } from "@/components/ui/button";
import { useSay } from "@/components/ui/toast";
import { useChange } from "@/components/ui/use-change";
import { Working } from "@/components/ui/working";
import { send } from "@/lib/http/send";
import type { CustodyCheckView } from "@/lib/views";

/** Checks one log as a whole; the list then shows what was found. */
export function CheckNow({ chainId, name }: { chainId: string; name: string }) {
  const router = useRouter();
  const say = useSay();
  const { refusal, busy, attempt, stop } = useChange();
  const run = () => attempt(async (signal) => {
    const check = await send<CustodyCheckView>("POST", `/api/audit/checks/${chainId}`, undefined, undefined, signal);
    say({ text: check.ok ? `${name}: the log checks out.` : `${name}: ${check.findings.length === 1 ? "one finding" : `${check.findings.length} findings`}. See the list.` });
    router.refresh();
  });
  return (
    <>
      <Button size="small" className="whitespace-nowrap" disabled={busy} reason={refusal} onClick={() => void run()}>{busy ? "Checking" : "Check now"}<span className="sr-only">: {name}</span></Button>
      {busy ? <Working what="The whole log is checked" onStop={stop} /> : null}
    </>
  );
}
