"use client";

import { useEffect, useRef, useState } from "react";
import { digestFile, type Running } from "@/components/chip/digest-file";
import { DropZone } from "@/components/chip/drop-zone";
import { Button } from "@/components/ui/button";
import { DigestInFull } from "@/components/ui/digest";
import { Note } from "@/components/ui/note";
import { Progress } from "@/components/ui/progress";
import { countOf } from "@/lib/core/quantity";
import { fetcher } from "@/lib/http/send";
import type { FindHit } from "@/lib/views";
import { FindHits } from "./find-hits";

interface Asked {
  key: number;
  name: string;
  size: number;
  share: number;
  sha256?: string;
  crc32?: string;
  hits?: FindHit[];
  refusal?: string;
}

/** Which read is this file? The digest is computed in this browser; only the digest is asked for, nothing is stored. */
export function FindFile() {
  const [files, setFiles] = useState<Asked[]>([]);
  const next = useRef(0);
  const running = useRef(new Map<number, Running<unknown>>());
  useEffect(() => {
    const all = running.current;
    return () => all.forEach((one) => one.stop());
  }, []);

  const put = (key: number, change: Partial<Asked>) => setFiles((before) => before.map((f) => (f.key === key ? { ...f, ...change } : f)));

  async function ask(file: File) {
    const key = (next.current += 1);
    setFiles((before) => [{ key, name: file.name, size: file.size, share: 0 }, ...before]);
    try {
      const digest = digestFile(file, (done) => put(key, { share: file.size > 0 ? done / file.size : 1 }));
      running.current.set(key, digest);
      const { sha256, crc32 } = await digest.result;
      put(key, { sha256, crc32, share: 1 });
      const { hits } = await fetcher<{ hits: FindHit[] }>(`/api/find?digest=${sha256}`);
      put(key, { hits });
    } catch (error) {
      put(key, { refusal: error instanceof Error ? error.message : "This file can’t be read. Choose it again." });
    } finally {
      running.current.delete(key);
    }
  }

  function take(key: number) {
    running.current.get(key)?.stop();
    running.current.delete(key);
    setFiles((before) => before.filter((f) => f.key !== key));
  }

  return (
    <div className="grid gap-5">
      <DropZone title="Drop a file to learn which read it is." onFiles={(chosen) => chosen.forEach((file) => void ask(file))}>
        Its digest is computed in this browser and only the digest is looked up. The file is not sent, and nothing is stored by asking.
      </DropZone>
      {files.map((file) => (
        <section key={file.key} aria-label={file.name} className="grid gap-2 border-t border-rule pt-3">
          <div className="flex flex-wrap items-baseline justify-between gap-3">
            <h3 className="min-w-0 [overflow-wrap:anywhere]"><span className="font-mono">{file.name}</span> <span className="font-normal text-ink-2">{countOf(file.size, "byte")}</span></h3>
            <Button size="small" variant="text" onClick={() => take(file.key)}>{file.sha256 || file.refusal ? "Take off the list" : "Stop"}</Button>
          </div>
          {file.sha256 ? <p className="text-t2"><span className="text-ink-2">CRC-32</span> <code>{file.crc32?.toUpperCase()}</code> <span className="text-ink-2">SHA-256</span> <DigestInFull sha256={file.sha256} /></p> : file.refusal ? null : <Progress share={file.share} label={`Digest of ${file.name}`} />}
          <div aria-live="polite">
            {file.refusal ? <Note kind="block" title="This file was not looked up.">{file.refusal}</Note> : null}
            {file.hits?.length === 0 ? <Note kind="note" title="No stored read equals this file.">Not one byte more or less would be found this way: compare it with a read if you expect it to be close.</Note> : null}
            {file.hits && file.hits.length > 0 ? <><p className="pb-1"><b>{countOf(file.hits.length, "stored read")} {file.hits.length === 1 ? "equals" : "equal"} this file in every byte.</b></p><FindHits hits={file.hits} caption={`Reads that equal ${file.name}`} /></> : null}
          </div>
        </section>
      ))}
    </div>
  );
}
