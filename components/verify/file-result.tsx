"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { DigestInFull } from "@/components/ui/digest";
import { FindingLine } from "@/components/ui/finding-line";
import { Icon } from "@/components/ui/icon";
import { Input } from "@/components/ui/input";
import { Section } from "@/components/ui/section";
import type { StreamDigests } from "@/lib/core/digest-stream";
import { sizeText, withCommas } from "@/lib/core/quantity";
import { fingerprintOf } from "@/lib/core/verify/seal";

/** Check numbers of one file, and whether they are those that somebody gives. */
export function FileResult({ file, digests, onAnother }: { file: File; digests: StreamDigests; onAnother(): void }) {
  const [pasted, setPasted] = useState("");
  const wanted = pasted.trim() === "" ? null : fingerprintOf(pasted);
  const wrong = pasted.trim() !== "" && wanted === null;
  const exact = `${withCommas(digests.sizeBytes)} bytes`;
  return (
    <Section title="One file" note={<span className="[overflow-wrap:anywhere]">{file.name}</span>} strong>
      <p className="max-w-[62ch] text-t4">It is no ZIP archive, so it was taken as a single file, such as a chip image. Compare its <span className="whitespace-nowrap">SHA-256</span> with the one on the summary, in the report or on the chip’s page.</p>
      <dl className="my-4 grid gap-3">
        <div><dt className="text-t2 text-ink-2">Size</dt><dd>{sizeText(digests.sizeBytes) === exact ? exact : `${sizeText(digests.sizeBytes)}, ${exact}`}</dd></div>
        <div><dt className="text-t2 text-ink-2">CRC-32</dt><dd><code>{digests.crc32.toUpperCase()}</code></dd></div>
        <div><dt className="text-t2 text-ink-2">SHA-256</dt><dd className="text-t4"><DigestInFull sha256={digests.sha256} /></dd></div>
      </dl>
      <Input label="SHA-256 to compare with" mono value={pasted} onChange={(event) => setPasted(event.target.value)} autoComplete="off" spellCheck={false} className="max-w-[640px]"
        hint="64 digits; spaces and capitals don’t matter." error={wrong ? "A SHA-256 has 64 hex digits. Check what you pasted." : undefined} />
      <div role="status" className="mt-2">
        {wanted === null ? null : wanted === digests.sha256
          ? <FindingLine kind="ok"><b>Equal.</b> This file is the one with that digest, in every byte.</FindingLine>
          : <FindingLine kind="block"><b>They differ.</b> This is another file, or it was changed.</FindingLine>}
      </div>
      <div className="no-print mt-4 flex flex-wrap items-center gap-x-3 gap-y-2"><Button onClick={() => window.print()}><Icon name="print" />Print</Button><Button variant="text" onClick={onAnother}>Check another file</Button></div>
    </Section>
  );
}
