"use client";

import { useRouter } from "next/navigation";
import { useRef, useState } from "react";
import { Button, Buttons } from "@/components/ui/button";
import { Checkbox } from "@/components/ui/checkbox";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { Working } from "@/components/ui/working";
import { countOf } from "@/lib/core/quantity";
import { type ImportAnswer, MAX_SHELF_FILE_BYTES } from "@/lib/core/shelf";
import { problemOf, Refusal } from "@/lib/http/send";
import { ImportLines } from "./import-lines";

const PASTED = "pasted text";

async function sendFile(file: File, tryOnly: boolean, reason: string, signal: AbortSignal): Promise<ImportAnswer> {
  const body = new FormData();
  body.set("try", tryOnly ? "yes" : "no");
  if (reason.trim()) body.set("reason", reason.trim());
  body.set("file", file);
  const response = await fetch("/api/shelf-boards/import", { method: "POST", body, signal, headers: { "idempotency-key": crypto.randomUUID?.() ?? String(Math.random()) } }).catch(() => {
    throw new Refusal(signal.aborted ? { status: 0, title: "Stopped", detail: "Stopped: the rows were only looked at." } : { status: 0, title: "Twinread can't be reached", detail: "Twinread can't be reached. Check the network; then try again." });
  });
  if (!response.ok) throw new Refusal(await problemOf(response));
  return (await response.json()) as ImportAnswer;
}

/** A file or pasted rows: first what each line would do, then all of it or nothing. */
export function ImportShelf() {
  const router = useRouter();
  const picker = useRef<HTMLInputElement>(null);
  const [source, setSource] = useState<"file" | "text">("file");
  const [[file, text, reason], set] = useState<[File | null, string, string]>([null, "", ""]);
  const [trying, setTrying] = useState(true);
  const [answer, setAnswer] = useState<ImportAnswer | null>(null);
  const { refusal, busy, attempt, stop, clear } = useChange();
  const given = source === "file" ? file : text.trim() === "" ? null : new File([text], PASTED, { type: "text/csv" });
  const missing = !given ? (source === "file" ? "Choose a file first." : "Paste the rows first.") : given.size > MAX_SHELF_FILE_BYTES ? "The file is larger than 10 MiB. Split it." : null;
  function change(next: [File | null, string, string]) {
    set(next);
    setAnswer(null);
    clear();
  }
  const run = (tryOnly: boolean) => attempt(async (signal) => {
    setTrying(tryOnly);
    setAnswer(await sendFile(given!, tryOnly, reason, signal));
    if (!tryOnly) router.refresh();
  });
  const writes = answer ? answer.counts.new + answer.counts.changed : 0;
  return (
    <div className="grid max-w-[1000px] gap-5">
      <fieldset className="flex flex-wrap gap-x-6 gap-y-1">
        <legend className="sr-only">Where the rows come from</legend>
        <Checkbox type="radio" name="source" label="A CSV file" checked={source === "file"} onChange={() => { setSource("file"); change([file, text, reason]); }} />
        <Checkbox type="radio" name="source" label="Rows that I paste" checked={source === "text"} onChange={() => { setSource("text"); change([file, text, reason]); }} />
      </fieldset>
      {source === "file" ? (
        <div className="flex flex-wrap items-center gap-3">
          <Button onClick={() => picker.current?.click()}>Choose a file</Button>
          <span className="font-mono text-t2 [overflow-wrap:anywhere]">{file ? file.name : <span className="font-face text-ink-2">No file chosen</span>}</span>
          <input ref={picker} type="file" accept=".csv,.txt,text/csv" className="sr-only" tabIndex={-1} aria-label="CSV file of the shelf" onChange={(event) => {
            const chosen = event.target.files?.[0] ?? null;
            event.target.value = "";
            change([chosen, text, reason]);
          }} />
        </div>
      ) : <TextArea label="Rows, with the header row first" rows={8} spellCheck={false} value={text} onChange={(event) => change([file, event.target.value, reason])} />}
      <Input label="Reason for what changes" hint="Goes into the log with each changed board; left empty, it names the file and the line." maxLength={2000} value={reason} onChange={(event) => change([file, text, event.target.value])} className="max-w-[560px]" />
      {refusal ? <Note kind="block" role="alert" title="Nothing was changed.">{refusal}</Note> : null}
      {answer ? <ImportLines answer={answer} /> : null}
      <Buttons>
        {answer && !answer.done && answer.counts.refused === 0 && writes > 0
          ? <Button variant="lead" disabled={busy} onClick={() => void run(false)}>Import {countOf(writes, "board")}</Button>
          : <Button variant="lead" disabled={busy} reason={missing} onClick={() => void run(true)}>{answer ? "Try it again" : "Try it"}</Button>}
      </Buttons>
      {busy ? <Working what={trying ? "The rows are read line by line" : "The boards are written, each with its entry in the log"} onStop={trying ? stop : undefined} note={trying ? undefined : "All of it or nothing, so it can’t be stopped half-way."} /> : null}
    </div>
  );
}
