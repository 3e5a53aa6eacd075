"use client";

import { useEffect, useRef, useState } from "react";
import { Button } from "@/components/ui/button";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { PaperName } from "@/components/ui/paper-name";
import { Progress } from "@/components/ui/progress";
import { Section } from "@/components/ui/section";
import { sizeText } from "@/lib/core/quantity";
import { fingerprintOf } from "@/lib/core/verify/seal";
import type { Progress as Reading } from "@/lib/core/verify/verify-bundle";
import { BundleResult } from "./bundle-result";
import { Checker, type Checked } from "./checker";
import { DropOne } from "./drop-one";
import { FileResult } from "./file-result";

type State =
  | { at: "choosing"; stopped?: true }
  | { at: "checking"; file: File; reading: Reading | null }
  | { at: "done"; file: File; checked: Checked; key: string | null };

/** Choose a file, see it checked, read what was found. Nothing leaves the browser. */
export function VerifyScreen() {
  const [state, setState] = useState<State>({ at: "choosing" });
  const [pasted, setPasted] = useState("");
  const [ready, setReady] = useState(false);
  const checker = useRef<Checker | null>(null);
  useEffect(() => {
    const mine = new Checker(setReady, (reading) => setState((now) => (now.at === "checking" ? { ...now, reading } : now)));
    checker.current = mine;
    void mine.load();
    return () => mine.close();
  }, []);
  const key = pasted.trim() === "" ? null : fingerprintOf(pasted);
  const wrong = pasted.trim() !== "" && key === null;

  async function check(file: File) {
    setState({ at: "checking", file, reading: null });
    const checked = await checker.current?.check({ file, expectedKey: key });
    if (checked) setState({ at: "done", file, checked, key });
  }
  function stop() {
    checker.current?.stop();
    setState({ at: "choosing", stopped: true });
  }
  const another = () => setState({ at: "choosing" });
  const again = state.at === "done" && state.checked.kind === "bundle" && !wrong && key !== state.key ? state.file : null;
  return (
    <div data-ready={ready || undefined}>
      <div className="no-print">
        <Section title="The file" note="It stays on this computer: the check runs in your browser and nothing is sent." first>
          {state.at === "checking" ? <Checking {...state} onStop={stop} /> : <DropOne onFile={(file) => void check(file)} />}
          {state.at === "choosing" && state.stopped ? <p role="status" className="mt-2 text-ink-2">Stopped. Nothing was found out about this file.</p> : null}
          <Input label="Key fingerprint from the mail or summary (optional)" mono value={pasted} onChange={(event) => setPasted(event.target.value)} autoComplete="off" spellCheck={false} className="mt-4 max-w-[640px]"
            hint="64 digits of the log key or the seal key. Without it the check can’t say whose keys these are."
            error={wrong ? "A key fingerprint has 64 hex digits. Check what you pasted; until then keys are not compared." : undefined} />
          {again ? <Button className="mt-3" onClick={() => void check(again)}>Check again with this fingerprint</Button> : null}
        </Section>
      </div>
      {state.at === "done" ? <PaperName what={`Check of ${state.file.name}`} /> : null}
      <div aria-live="polite">
        {state.at !== "done" ? null : state.checked.kind === "bundle" ? <BundleResult file={state.file} report={state.checked.report} onAnother={another} />
          : state.checked.kind === "file" ? <FileResult key={state.checked.digests.sha256} file={state.file} digests={state.checked.digests} onAnother={another} />
          : <Section title="Not checked"><Note kind="block" role="alert" title={state.file.name}>{state.checked.sentence}</Note></Section>}
      </div>
    </div>
  );
}

function Checking({ file, reading, onStop }: { file: File; reading: Reading | null; onStop(): void }) {
  const share = reading && reading.totalBytes > 0 ? reading.doneBytes / reading.totalBytes : 0;
  return (
    <div className="grid gap-2 border-2 border-rule-2 bg-sheet px-5 py-[18px] phone:px-4">
      <p className="flex flex-wrap items-baseline justify-between gap-x-4"><b className="font-mono [overflow-wrap:anywhere]">{file.name}</b><span className="text-ink-2">{sizeText(file.size)}</span></p>
      <Progress share={share} label={`Checking ${file.name}`} />
      <p role="status" className="min-h-5 text-ink-2 [overflow-wrap:anywhere]">Checking {reading ? reading.what : "what kind of file it is"}</p>
      <div><Button onClick={onStop}>Stop checking</Button></div>
    </div>
  );
}
