"use client";

import { useState } from "react";
import { Button, Buttons } from "@/components/ui/button";
import { Empty } from "@/components/ui/empty";
import { FindingLine } from "@/components/ui/finding-line";
import { Mark } from "@/components/ui/mark";
import { Note } from "@/components/ui/note";
import { momentText } from "@/components/ui/times";
import { whenAsked } from "@/components/ui/when-asked";
import { may } from "@/lib/core/policy";
import { countOf, sizeText } from "@/lib/core/quantity";
import { seatingLetter } from "@/lib/core/words";
import type { ChipView, SessionView, TransferView } from "@/lib/views";
import { approvedRead, nameOf } from "./chip-words";
import { EncryptionNote } from "./encryption-note";
import { HandOut } from "./hand-out";

const TransferDialog = whenAsked(() => import("./transfer-dialog").then((m) => m.TransferDialog));
const KIND = { write: "Written", "chip-moved": "Chip moved" } as const;

/** Image out, transfer recorded, read-backs in; each transfer with what came back of it. */
export function TransferSection({ chip, user, timeZone, onChanged }: { chip: ChipView; user: SessionView["user"]; timeZone: string; onChanged(): Promise<unknown> }) {
  const [recording, setRecording] = useState(false);
  const donor = chip.pair?.designator ?? chip.designator;
  const image = approvedRead(chip);
  const own = chip.reads.find((r) => r.stage === "donor" && r.counted);
  const mayTake = may(user, "read.hand-out-approved");
  const writeNow = chip.case.open && (chip.state.state === "approved" || chip.state.state === "failed");
  const all = countOf(chip.sizeBytes, "byte");

  if (chip.transfers.length === 0 && !chip.approval) {
    return (
      <div className="grid gap-3">
        <Empty title="Nothing has been written yet.">
          After approval, download the image here, write it to donor {donor} and upload {countOf(chip.policy.readBacks, "read-back")}, {chip.policy.readBackSeatings > 1 ? "the second after re-seating the clip" : "one seating is enough"}. Each must equal the approved image in all {all}.
        </Empty>
        {own && mayTake && chip.donorSaved ? <Buttons><HandOut readId={own.id}>Donor’s own content</HandOut></Buttons> : null}
      </div>
    );
  }
  return (
    <div className="grid grid-cols-[minmax(0,1fr)_424px] gap-x-10 mid:grid-cols-[minmax(0,1fr)_360px] narrow:grid-cols-[minmax(0,1fr)] narrow:gap-y-[22px] print:grid-cols-[minmax(0,1fr)] print:gap-y-3">
      <ul>
        {chip.transfers.map((transfer, i) => <TransferLines key={transfer.id} chip={chip} transfer={transfer} place={i + 1} timeZone={timeZone} />)}
        {chip.transfers.length === 0 ? <li className="border-b border-rule py-[7px]"><FindingLine kind="wait">Cleared, not written yet. Write the approved image to donor {donor}, then record it here.</FindingLine></li> : null}
      </ul>
      <div className="grid content-start gap-3.5">
        {writeNow ? <Note kind="caution" title={`Write to the donor only: donor ${donor}.`}>Never to the original chip. A wrong image can leave a drive beyond repair: compare the digest of the downloaded file before writing.</Note> : null}
        {mayTake ? <EncryptionNote encryption={chip.drive.encryption} /> : null}
        <Buttons>
          {image && mayTake ? <HandOut readId={image.id} lead={writeNow}>{`Approved ${image.derived ? "composite" : "image"}, ${sizeText(image.sizeBytes)}`}</HandOut> : null}
          {own && mayTake && chip.donorSaved ? <HandOut readId={own.id}>Donor’s own content</HandOut> : null}
          {chip.approval && chip.case.open && may(user, "transfer.record") ? <Button onClick={() => setRecording(true)}>Record the transfer…</Button> : null}
        </Buttons>
        {chip.approval ? null : <p className="text-ink-2">The approval no longer stands. It takes a new one before anything is written.</p>}
      </div>
      {recording && chip.approval ? <TransferDialog onClose={() => setRecording(false)} chip={chip} approval={chip.approval} onChanged={onChanged} /> : null}
    </div>
  );
}

function TransferLines({ chip, transfer, place, timeZone }: { chip: ChipView; transfer: TransferView; place: number; timeZone: string }) {
  const backs = chip.reads.filter((r) => r.stage === "after" && r.transferId === transfer.id);
  const cleared = chip.approvals.find((a) => a.id === transfer.approvalId);
  const tools = [transfer.programmer, transfer.toolVersion, transfer.adapter].filter(Boolean).join(", ");
  const line = "grid grid-cols-[16px_minmax(0,1fr)_auto] gap-x-2.5 border-b border-rule py-[7px] slim:grid-cols-[16px_minmax(0,1fr)]";
  const when = "whitespace-nowrap text-ink-2 slim:col-start-2";
  return (
    <>
      <li className={line}>
        <Mark kind="note" label={`Transfer ${place}`} className="mt-0.5" />
        <span><b>{KIND[transfer.kind]}</b> by {transfer.by.name}{tools ? `, ${tools}` : ""}{transfer.note ? <span className="block text-ink-2">“{transfer.note}”</span> : null}</span>
        <span className={when}>{momentText(transfer.at, timeZone)}</span>
      </li>
      {backs.map((read) => {
        const equal = read.sha256 === cleared?.sha256;
        const found = read.findings.find((f) => f.severity === "blocks") ?? read.findings.find((f) => f.code !== "verified");
        return (
          <li key={read.id} className={line}>
            <Mark kind={read.setAside ? "aside" : equal ? "ok" : "block"} label={read.setAside ? "Set aside" : equal ? "Equal" : "Differs"} className="mt-0.5 [--hole:var(--paper)]" />
            <span className={read.setAside ? "text-ink-3" : ""}>{nameOf(read)}{equal ? " equals the approved image" : `: ${found?.message ?? "differs from the approved image."}`}{read.setAside ? ` Set aside: ${read.setAside.reason}` : ""}</span>
            <span className={when}>{momentText(read.storedAt, timeZone)}, seating {seatingLetter(read.seating)}</span>
          </li>
        );
      })}
      {backs.length === 0 ? <li className={line}><Mark kind="wait" label="Open" className="mt-0.5" /><span>No read-back yet. Read the donor’s chip and add the file above as a read-back.</span><span /></li> : null}
    </>
  );
}
