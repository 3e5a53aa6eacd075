"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button, Buttons } from "@/components/ui/button";
import { Note } from "@/components/ui/note";
import { Section } from "@/components/ui/section";
import { exactText } from "@/components/ui/times";
import { useChange } from "@/components/ui/use-change";
import { Working } from "@/components/ui/working";
import { entriesText } from "./entries-text";
import { fetcher, send } from "@/lib/http/send";
import type { CustodyCheckView, CustodyEntryView } from "@/lib/views";
import { Assess } from "./assessment-form";
import { ChainCheck } from "./chain-check";
import { LogTable } from "./log-table";
import { ViaLegend } from "./via-legend";

/** The log of one drive: its check on demand, then its entries. */
export function DriveLog({ driveId, entries, timeZone, assesses, records }: {
  driveId: string;
  entries: CustodyEntryView[];
  timeZone: string;
  assesses: boolean;
  /** the check is written down for the audit pages */
  records: boolean;
}) {
  const router = useRouter();
  const [check, setCheck] = useState<{ result: CustodyCheckView; at: string } | null>(null);
  const { refusal, busy, attempt, stop } = useChange();
  const [show, setShow] = useState<{ seq: number } | null>(null);
  const ask = (signal: AbortSignal) => (records ? send<CustodyCheckView>("POST", `/api/audit/checks/${driveId}`, undefined, undefined, signal) : fetcher<CustodyCheckView>(`/api/drives/${driveId}/custody/check`, signal));
  const run = () => attempt(async (signal) => setCheck({ result: await ask(signal), at: new Date().toISOString() }));

  return (
    <>
      <Section strong title="Chain check" note={check ? exactText(check.at, timeZone) : "Not checked on this page yet."}>
        {check ? <ChainCheck check={check.result} onShow={(seq) => setShow({ seq })} /> : (
          <p className="max-w-[62ch] text-t4 text-ink-2">The log has {entriesText(entries.length)}. The check computes every hash again, checks every signature and compares the head. It reports and never repairs.</p>
        )}
        {refusal ? <Note kind="caution" role="alert" title="The log was not checked." className="mt-3">{refusal}</Note> : null}
        <Buttons className="mt-4"><Button variant={check ? "plain" : "lead"} disabled={busy} onClick={() => void run()}>{busy ? "Checking the log" : check ? "Check the log again" : "Check the log"}</Button></Buttons>
        {busy ? <div className="mt-3"><Working what={`Every hash and signature of ${entriesText(entries.length)} is worked out again`} onStop={stop} /></div> : null}
        {check && !check.result.ok ? (
          <Assess chainId={driveId} latest={entries.at(-1)?.action} assesses={assesses} onDone={() => { router.refresh(); void run(); }} />
        ) : null}
      </Section>
      <Section title="Entries" aside={<ViaLegend />}>
        <LogTable entries={entries} timeZone={timeZone} show={show} against={check?.result.findings.flatMap((f) => (f.seq === null ? [] : [f.seq])) ?? []} />
      </Section>
    </>
  );
}
