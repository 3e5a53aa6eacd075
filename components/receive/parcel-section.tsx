import { ButtonLink } from "@/components/ui/button";
import { Section } from "@/components/ui/section";
import type { CaseState, ReceiptView } from "@/lib/views";
import { ReceiptFacts } from "./receipt-facts";

/** On the case's page: the parcel as it came, or that it is still to come. */
export function ParcelSection({ caseId, state, receipt, receives, timeZone }: { caseId: string; state: CaseState; receipt: ReceiptView | null; receives: boolean; timeZone: string }) {
  const act = receives && state !== "closed" && !receipt;
  if (!receipt && !act && state !== "requested") return null;
  return (
    <Section title="Parcel" note={receipt ? "As it came." : state === "requested" ? "Asked for, not here yet." : "Brought to the desk."}>
      {receipt ? <ReceiptFacts receipt={receipt} timeZone={timeZone} /> : <p className="text-ink-2">{state === "requested" ? "When it comes, compare it with the request before anything is opened." : "Its condition, seal and what came with it are not recorded yet."}</p>}
      {act ? <div className="no-print mt-3"><ButtonLink variant={state === "requested" ? "lead" : "plain"} href={`/receive/${caseId}`}>{state === "requested" ? "Receive the parcel" : "Record what came"}</ButtonLink></div> : null}
    </Section>
  );
}
