"use client";

import { useRouter } from "next/navigation";
import { type ChangeEvent, type DragEvent, useEffect, useId, useRef, useState, useSyncExternalStore } from "react";
import { Button } from "@/components/ui/button";
import { FindingLine } from "@/components/ui/finding-line";
import { Input } from "@/components/ui/input";
import { Progress } from "@/components/ui/progress";
import { PHOTO_ACCEPT } from "@/lib/core/photo-kind";
import type { PhotoSubject } from "@/lib/core/words";
import { MAX_CAPTION_CHARACTERS } from "@/lib/limits";
import { browserTools, PhotoQueue, type PhotoStep, type PhotoUpload } from "./photo-queue";
import { fileSize, FOLDER } from "./photo-words";

const NONE: readonly PhotoUpload[] = [];
const WORDS: Record<PhotoStep, string> = { waiting: "Waits to be sent", sending: "", stored: "Stored", refused: "Not stored", stopped: "Stopped, nothing stored" };
const TONE: Record<PhotoStep, string> = { waiting: "text-ink-2", sending: "", stored: "font-semibold text-green", refused: "font-semibold text-block", stopped: "font-semibold text-ink-2" };

/** Photos and documents by picker, by the phone's camera or dropped here; each goes by itself and tells how far it is. */
export function AddPhotos({ of, name }: { of: { type: PhotoSubject; id: string }; /** "Drive A" */ name: string }) {
  const router = useRouter();
  const [queue] = useState(() => new PhotoQueue(browserTools(`/api/${FOLDER[of.type]}/${of.id}/photos`)));
  useEffect(() => queue.tell(() => router.refresh()), [queue, router]);
  const uploads = useSyncExternalStore(queue.subscribe, queue.uploads, () => NONE);
  const busy = uploads.some((one) => one.step === "waiting" || one.step === "sending");
  useEffect(() => {
    if (!busy) return;
    const ask = (event: BeforeUnloadEvent) => event.preventDefault();
    window.addEventListener("beforeunload", ask);
    return () => window.removeEventListener("beforeunload", ask);
  }, [busy]);
  const [caption, setCaption] = useState("");
  const [over, setOver] = useState(false);
  const [picker, camera] = [useRef<HTMLInputElement>(null), useRef<HTMLInputElement>(null)];
  const hint = useId();

  function take(files: File[]) {
    if (files.length === 0) return;
    void queue.add(files, caption.trim());
    setCaption("");
  }
  function onChosen(event: ChangeEvent<HTMLInputElement>) {
    const files = [...(event.target.files ?? [])];
    // so that the same file can be chosen once more
    event.target.value = "";
    take(files);
  }
  function onDrop(event: DragEvent) {
    event.preventDefault();
    setOver(false);
    take([...event.dataTransfer.files]);
  }
  return (
    <div className="no-print grid gap-2">
      <div onDragOver={(event) => { event.preventDefault(); setOver(true); }} onDragLeave={() => setOver(false)} onDrop={onDrop} className={`photo-add ${over ? "is-over" : ""}`}>
        <Input label={<>Caption for what you choose next<span className="sr-only">, of {name}</span></>} placeholder="Burnt connector" maxLength={MAX_CAPTION_CHARACTERS} value={caption} onChange={(event) => setCaption(event.target.value)} autoComplete="off" />
        <div className="flex flex-wrap items-center gap-2">
          <Button onClick={() => picker.current?.click()} aria-describedby={hint}>Choose photos</Button>
          <span className="photo-camera"><Button onClick={() => camera.current?.click()}>Take a photo</Button></span>
        </div>
        <p id={hint} className="text-t2 text-ink-2">Or drop them here. JPEG, PNG, WebP or PDF, up to 20 MiB each. They are kept as they come.</p>
        <input ref={picker} type="file" multiple accept={PHOTO_ACCEPT} className="sr-only" tabIndex={-1} aria-label={`Photos of ${name}`} onChange={onChosen} />
        <input ref={camera} type="file" accept="image/jpeg,image/png,image/webp" capture="environment" className="sr-only" tabIndex={-1} aria-label={`Camera, for ${name}`} onChange={onChosen} />
      </div>
      {uploads.length > 0 ? <ul className="grid">{uploads.map((one) => <Line key={one.key} upload={one} queue={queue} />)}</ul> : null}
    </div>
  );
}

function Line({ upload: { key, file, caption, step, sent, problem, again }, queue }: { upload: PhotoUpload; queue: PhotoQueue }) {
  const off = <Button variant="text" size="small" onClick={() => queue.remove(key)} aria-label={`Take ${file.name} off the list`}>Take off the list</Button>;
  return (
    <li className="grid grid-cols-[minmax(0,1fr)_auto] items-start gap-x-5 gap-y-1 border-b border-rule py-2">
      <span className="[overflow-wrap:anywhere]"><span className="font-mono text-t2 font-semibold">{file.name}</span> <span className="text-t2 text-ink-2">{fileSize(file.size)}{caption ? `, ${caption}` : ""}</span></span>
      <span className={`text-right text-t2 ${TONE[step]}`} role="status">{step === "sending" ? (sent < file.size ? `${fileSize(sent)} sent` : "Sent, being looked at") : WORDS[step]}</span>
      {step === "sending" ? <span className="col-span-full"><Progress share={sent / Math.max(1, file.size)} label={`Sending ${file.name}`} /></span> : null}
      {problem ? <div className="col-span-full text-t2" role="alert"><FindingLine kind="block">{problem}</FindingLine></div> : null}
      <span className="col-span-full flex flex-wrap justify-end gap-x-4">
        {step === "sending" && sent >= file.size ? <span className="text-t2 text-ink-2">Kept as a whole, or not at all: this can’t be stopped.</span> : step === "waiting" || step === "sending" ? <Button variant="text" size="small" onClick={() => queue.stop(key)} aria-label={`Stop sending ${file.name}`}>Stop sending</Button> : (
          <>{again && step !== "stored" ? <Button size="small" onClick={() => queue.again(key)}>Send again</Button> : null}{off}</>
        )}
      </span>
    </li>
  );
}
