"use client";

import type { FormEvent } from "react";
import type { FieldErrors, UseFormRegister } from "react-hook-form";
import { Button, Buttons } from "@/components/ui/button";
import { Input } from "@/components/ui/input";
import { Mark } from "@/components/ui/mark";
import { TextArea } from "@/components/ui/text-area";
import { Working } from "@/components/ui/working";
import type { ChipView, SessionView } from "@/lib/views";
import type { DecisionForm } from "./decision-rules";
import { WhoMaySign } from "./who-may-sign";

/** Statement, typed digits, signature. The button waits, and says for what. */
export function Sign({ chip, user, composite, open, matches, busy, register, errors, onSubmit, onSendBack }: {
  chip: ChipView;
  user: SessionView["user"];
  /** the image is a composite, and the button says so */
  composite: boolean;
  /** what is still missing, in words */
  open: string | null;
  matches: boolean;
  busy: boolean;
  register: UseFormRegister<DecisionForm>;
  errors: FieldErrors<DecisionForm>;
  onSubmit(event: FormEvent): void;
  onSendBack: (() => void) | null;
}) {
  return (
    <form onSubmit={onSubmit} noValidate className="no-print grid grid-cols-[minmax(0,1fr)_minmax(0,420px)] gap-x-10 gap-y-[22px] narrow:grid-cols-[minmax(0,1fr)]">
      <div className="grid content-start gap-3.5">
        <WhoMaySign chip={chip} user={user} />
        <TextArea label="Statement" hint={`Why you clear this ${composite ? "composite" : "image"}. The auditor reads this, the customer doesn’t.`} error={errors.statement?.message} {...register("statement")} />
      </div>
      <Input mono label="Last 8 digits of the SHA-256, typed from above" autoComplete="off" spellCheck={false} maxLength={16} error={matches ? undefined : errors.last8?.message}
        hint={matches ? <span className="text-green"><Mark kind="done" className="[--hole:var(--paper)]" /> Matches the image on this sheet.</span> : "Typed by hand, so that an eye has been on the digest."} {...register("last8")} />
      <Buttons className="col-span-full pt-1">
        <Button type="submit" variant="lead" reason={open} disabled={busy}>{composite ? "Approve the composite" : "Approve"} for writing to donor {chip.pair?.designator ?? ""}</Button>
        {onSendBack ? <Button variant="stop" onClick={onSendBack}>Send back…</Button> : null}
      </Buttons>
      {busy ? <div className="col-span-full"><Working what="The stored image and the log are checked once more, then the approval is signed" note="It is given as a whole or not at all, so it can’t be stopped half-way." /></div> : null}
    </form>
  );
}
