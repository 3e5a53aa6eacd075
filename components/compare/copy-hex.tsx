"use client";

import { useState } from "react";
import { Button } from "@/components/ui/button";
import { controlClass } from "@/components/ui/field";
import { Select } from "@/components/ui/select";
import { countOf } from "@/lib/core/quantity";
import { address } from "@/lib/core/strip";
import type { Range } from "@/lib/core/words";
import { bytesFetcher, Refusal } from "@/lib/http/send";
import { MAX_BYTES_WINDOW } from "@/lib/limits";
import type { ReadView } from "@/lib/views";
import { asHex } from "./hex-rows";
import { parseAddress } from "./places";

/** Copies a stretch of one read as pairs of hex digits, 16 a line: the range at the address, or any up to 64 KiB. */
export function CopyHex({ reads, names, stretch, sizeBytes }: { reads: readonly ReadView[]; names: readonly string[]; stretch: Range; sizeBytes: number }) {
  const [wrong, setWrong] = useState<string | null>(null);
  const [said, setSaid] = useState("");

  async function copy(form: FormData) {
    setSaid("");
    const read = reads[Number(form.get("read"))];
    const [first, last] = ["first", "last"].map((name) => parseAddress(String(form.get(name))));
    const problem = first === null || last === null ? "Type addresses such as 0x1F03A." : last < first ? "The last address lies before the first." : last >= read.sizeBytes ? `The last address of this read is ${address(read.sizeBytes - 1, sizeBytes)}.`
      : last - first >= MAX_BYTES_WINDOW ? "Copy at most 64 KiB at a time." : null;
    setWrong(problem);
    if (problem || first === null || last === null) return;
    const length = last - first + 1;
    try {
      const bytes = await bytesFetcher(`/api/reads/${read.id}/bytes?offset=${first}&length=${length}`);
      await navigator.clipboard.writeText(asHex(bytes));
      setSaid(`${countOf(length, "byte")} copied.`);
    } catch (error) {
      setWrong(error instanceof Refusal ? error.detail : "This browser does not allow copying here. Mark the bytes and copy them yourself.");
    }
  }

  const field = (name: string, label: string, at: number) => (
    <input key={`${name} ${at}`} name={name} aria-label={label} defaultValue={address(at, sizeBytes)} autoComplete="off" spellCheck={false} aria-invalid={wrong ? true : undefined} aria-describedby="copy-says" className={controlClass(Boolean(wrong), true, "!w-[118px] min-h-control")} />
  );
  return (
    <form className="no-print flex flex-wrap items-center gap-x-2.5 gap-y-2 text-t2" aria-label="Copy as hex" onSubmit={(event) => { event.preventDefault(); void copy(new FormData(event.currentTarget)); }}>
      <span>Copy</span>
      <Select quiet label="Read to copy from" name="read" options={names.map((name, side) => ({ value: String(side), label: name }))} />
      <span>from</span>{field("first", "First address to copy", stretch.start)}<span>to</span>{field("last", "Last address to copy", stretch.start + stretch.length - 1)}
      <Button type="submit">Copy as hex</Button>
      <span id="copy-says" role="status" className={wrong ? "font-medium text-block" : ""}>{wrong ?? said}</span>
    </form>
  );
}
