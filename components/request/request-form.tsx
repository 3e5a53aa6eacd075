"use client";

import { useRouter } from "next/navigation";
import { useEffect, useRef, useState, useSyncExternalStore } from "react";
import { Button, Buttons } from "@/components/ui/button";
import { Icon } from "@/components/ui/icon";
import { Working } from "@/components/ui/working";
import { listText } from "@/lib/core/quantity";
import { Refusal } from "@/lib/http/send";
import { type Draft, draftStore, errorsIn, errorsOf, type Errors, FIELD_WORDS, type FieldName, openFields } from "./draft";
import { ErrorSummary } from "./error-summary";
import { DriveLabel, TheBoard, WhatHappened, You } from "./form-questions";
import { PhotoPicker } from "./photo-picker";
import { sendRequest } from "./send-request";
import { YourLeave } from "./your-leave";

interface Refused {
  /** what was typed when it was refused: an error of a field goes as soon as the field changes */
  draft: Draft;
  errors: Errors;
  sentence: string;
}

const words = (name: FieldName) => FIELD_WORDS[name as keyof typeof FIELD_WORDS];

/** "Two things are open: the part number and your signature." */
function openSentence(open: FieldName[]): string {
  const slip = "The slip with your case number opens once the request is sent.";
  if (open.length === 0) return `Everything is filled in. ${slip}`;
  const named = open.slice(0, 3).map(words);
  const rest = open.length - named.length;
  const count = open.length === 1 ? "One thing is" : open.length === 2 ? "Two things are" : `${open.length} things are`;
  return `${count} open: ${rest > 0 ? `${named.join(", ")} and ${rest} more` : listText(named)}. ${slip}`;
}

/** The public form. What was typed stays through a refusal and a reload; what is open is named and can be gone to. */
export function RequestForm({ keepDays, stamp, today, workshop, ask }: {
  keepDays: number;
  /** from the server, when this page was made */
  stamp: string;
  today: string;
  workshop: string;
  /** whom to ask about one's data */
  ask: string;
}) {
  const router = useRouter();
  const stored = useSyncExternalStore(draftStore.subscribe, draftStore.get, draftStore.atServer);
  // a line that named other days was never ticked
  const draft: Draft = stored.keepDays === String(keepDays) ? stored : { ...stored, keepDays: String(keepDays), consentRead: false };
  const [files, setFiles] = useState<File[]>([]);
  const [tries, setTries] = useState(0);
  const [busy, setBusy] = useState(false);
  const [refused, setRefused] = useState<Refused | null>(null);
  const sending = useRef<AbortController | null>(null);
  const trap = useRef<HTMLInputElement>(null);
  const summary = useRef<HTMLDivElement>(null);
  useEffect(() => {
    if (tries > 0) summary.current?.focus();
  }, [tries]);

  const own = errorsIn(draft);
  const open = openFields(own);
  const served = Object.fromEntries(Object.entries(refused?.errors ?? {}).filter(([name]) => refused!.draft[name as FieldName] === draft[name as FieldName])) as Errors;
  const errors: Errors = tries > 0 ? { ...served, ...own } : {};
  const form = { draft, errors };

  async function submit() {
    // from now on the ticked line and its days belong together
    draftStore.set(draft);
    setRefused(null);
    if (open.length > 0) return setTries(tries + 1);
    setBusy(true);
    sending.current = new AbortController();
    try {
      const sent = await sendRequest(draft, files, { website: trap.current?.value ?? "", stamp }, sending.current.signal);
      draftStore.clear();
      router.push(new URL(sent.link).pathname);
    } catch (error) {
      setBusy(false);
      if (!(error instanceof Refusal)) throw error;
      setRefused({ draft, errors: errorsOf(error.problem.errors ?? []), sentence: error.detail });
      setTries(tries + 1);
    }
  }

  return (
    <form noValidate onSubmit={(event) => { event.preventDefault(); void submit(); }} aria-label="Request">
      <ErrorSummary ref={summary} errors={errors} sentence={refused?.sentence ?? null} shown={tries > 0 && (openFields(errors).length > 0 || refused !== null)} />
      <You form={form} />
      <DriveLabel form={form} />
      <TheBoard form={form} />
      <WhatHappened form={form} />
      <PhotoPicker files={files} onFiles={setFiles} error={null} />
      <YourLeave form={form} keepDays={keepDays} today={today} workshop={workshop} ask={ask} />
      <div className="rq-trap" aria-hidden="true"><label>Leave this empty<input ref={trap} type="text" name="website" tabIndex={-1} autoComplete="off" defaultValue="" /></label></div>
      <Buttons className="pt-5">
        <Button type="submit" variant="lead" disabled={busy}>Send the request</Button>
        <Button disabled><Icon name="print" />Slip for the parcel</Button>
        <span className="text-ink-2" role="status">{busy ? "Sending." : openSentence(open)}</span>
      </Buttons>
      {busy ? <div className="pt-2"><Working what={files.length > 0 ? "Your answers and photos are being sent" : "Your answers are being sent"} onStop={() => sending.current?.abort()} /></div> : null}
    </form>
  );
}
