"use client";

import { useRouter } from "next/navigation";
import { type ReactNode, useEffect, useRef, useState } from "react";
import { Button, Buttons } from "@/components/ui/button";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { readCaseRef } from "@/lib/core/case-number";
import { mistyped, NOT_A_NUMBER } from "@/lib/core/receipt-words";
import { closeCamera, openCamera, watch } from "./camera";

/** What stands against a number before the workshop is asked about it; null when nothing does. */
function problemOf(text: string): string | null {
  const reading = readCaseRef(text);
  if (reading.kind === "ref") return null;
  return reading.kind === "no-ref" ? NOT_A_NUMBER : mistyped(reading.ref);
}

function Camera({ onFound, onClose, onTrouble }: { onFound(text: string): void; onClose(): void; onTrouble(sentence: string): void }) {
  const video = useRef<HTMLVideoElement>(null);
  const tell = useRef({ onFound, onTrouble });
  useEffect(() => { tell.current = { onFound, onTrouble }; });
  useEffect(() => {
    let gone = false;
    let end = () => {};
    void openCamera().then(async (opened) => {
      if ("sentence" in opened) {
        if (!gone) tell.current.onTrouble(opened.sentence);
        return;
      }
      if (gone || !video.current) return closeCamera(opened.stream);
      video.current.srcObject = opened.stream;
      await video.current.play().catch(() => undefined);
      const stop = watch(video.current, opened.detector, (text) => tell.current.onFound(text));
      end = () => { stop(); closeCamera(opened.stream); };
      if (gone) end();
    });
    return () => { gone = true; end(); };
  }, []);
  return (
    <div className="grid max-w-[420px] gap-2">
      <video ref={video} muted playsInline aria-label="Picture of the camera" className="aspect-[4/3] w-full border border-rule-2 bg-well object-cover" />
      <Buttons><Button onClick={onClose}>Stop the camera</Button><span className="text-t2 text-ink-2">Hold the square code of the slip into the picture.</span></Buttons>
    </div>
  );
}

/**
 * The number, typed, from a handheld scanner (which types and sends Enter), or by the camera. The field keeps its own value:
 * a scanner is done before the page is awake, and the form then goes the plain way. React plays the focus again when it
 * wakes: selecting then would let the rest of a scan write over its beginning.
 */
export function ScanBox({ number = "", trouble: given }: { number?: string; trouble?: ReactNode }) {
  const router = useRouter();
  const [camera, setCamera] = useState(false);
  const [trouble, setTrouble] = useState<string | null>(null);
  const go = (text: string) => router.push(`/receive?number=${encodeURIComponent(text.trim())}`);
  const found = (text: string) => {
    const problem = problemOf(text);
    setTrouble(problem && `The code says “${text.slice(0, 60)}”. ${problem}`);
    if (problem) return;
    setCamera(false);
    go(text);
  };
  return (
    <div className="grid gap-4">
      <form action="/receive" method="get" noValidate className="flex flex-wrap items-end gap-x-3 gap-y-3" onSubmit={(event) => {
        event.preventDefault();
        const text = String(new FormData(event.currentTarget).get("number") ?? "");
        const problem = problemOf(text);
        setTrouble(problem);
        if (!problem) go(text);
      }}>
        <Input label="Case number" name="number" mono autoFocus autoComplete="off" autoCapitalize="characters" spellCheck={false} enterKeyHint="go" className="w-[260px] max-w-full" hint="26-0183 or 26-0183.4" defaultValue={number}
          onFocus={(event) => { if (event.target.value === number) event.target.select(); }} onChange={() => setTrouble(null)} />
        <div className="flex flex-wrap gap-3 self-start pt-6"><Button type="submit" variant="lead">Find the case</Button>{camera ? null : <Button onClick={() => { setTrouble(null); setCamera(true); }}>Scan with the camera</Button>}</div>
      </form>
      {camera ? <Camera onFound={found} onClose={() => setCamera(false)} onTrouble={(sentence) => { setCamera(false); setTrouble(sentence); }} /> : null}
      {trouble ? <Note kind="caution" role="alert" title={trouble} /> : given}
    </div>
  );
}
