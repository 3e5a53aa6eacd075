"use client";

import { useEffect, useId, useMemo, useState } from "react";
import { Button, buttonClass } from "@/components/ui/button";
import { Mark } from "@/components/ui/mark";
import { PHOTO_ACCEPT } from "@/lib/core/photo-kind";
import { countOf, withCommas } from "@/lib/core/quantity";
import { KIB, MAX_PHOTO_BYTES, MAX_REQUEST_BYTES, MAX_REQUEST_PHOTOS, MIB } from "@/lib/limits";
import { Part } from "./form-parts";

const HEIC = /\.(heic|heif)$/i;
const sizeWords = (bytes: number) => (bytes >= MIB ? `${(bytes / MIB).toFixed(1)} MiB` : `${withCommas(Math.ceil(bytes / KIB))} KiB`);

/** Why a file isn't taken along; the server looks at the bytes themselves later. */
function against(file: File): string | null {
  if (HEIC.test(file.name) || /hei[cf]/.test(file.type)) return "is a HEIC photo. Set the phone’s camera to “most compatible”, or share it as JPEG, then choose it again.";
  if (!PHOTO_ACCEPT.split(",").includes(file.type)) return "is no JPEG, PNG, WebP or PDF. Save it as one of these, then choose it again.";
  if (file.size === 0) return "is empty. Take the photo again.";
  if (file.size > MAX_PHOTO_BYTES) return `has ${sizeWords(file.size)}; up to ${sizeWords(MAX_PHOTO_BYTES)} is taken. Choose a smaller copy.`;
  return null;
}

function Thumb({ file }: { file: File }) {
  const url = useMemo(() => URL.createObjectURL(file), [file]);
  useEffect(() => () => URL.revokeObjectURL(url), [url]);
  return <span aria-hidden="true" className="block h-14 w-14 flex-none border border-rule-2 bg-sheet bg-cover bg-center" style={{ backgroundImage: `url("${url}")` }} />;
}

/** Up to eight photos from the picker or the phone's camera. */
export function PhotoPicker({ files, onFiles, error }: { files: readonly File[]; onFiles(files: File[]): void; error: string | null }) {
  const id = useId();
  const [refused, setRefused] = useState<string[]>([]);
  function add(list: FileList | null) {
    const sentences: string[] = [];
    const next = [...files];
    for (const file of list ?? []) {
      const why = against(file);
      const known = next.some((other) => other.name === file.name && other.size === file.size && other.lastModified === file.lastModified);
      if (why) sentences.push(`${file.name} ${why}`);
      else if (known) continue;
      else if (next.length >= MAX_REQUEST_PHOTOS) sentences.push(`${file.name} is one too many: ${MAX_REQUEST_PHOTOS} come along at most.`);
      else if ([...next, file].reduce((sum, one) => sum + one.size, 0) > MAX_REQUEST_BYTES) sentences.push(`${file.name} is too much: all together may have ${sizeWords(MAX_REQUEST_BYTES)}. Choose a smaller copy.`);
      else next.push(file);
    }
    setRefused(sentences);
    onFiles(next);
  }
  return (
    <Part number={5} title="Photos, if you have some">
      <p className="text-ink-2">Label, board from both sides, connector, and what looks burnt or wet. JPEG, PNG or WebP; where a photo was taken is not shown to anyone.</p>
      {files.length > 0 ? (
        <ul className="grid gap-2 pt-3">
          {files.map((file) => (
            <li key={`${file.name} ${file.size} ${file.lastModified}`} className="flex items-center gap-3">
              {file.type.startsWith("image/") ? <Thumb file={file} /> : null}
              <span className="min-w-0 flex-1 [overflow-wrap:anywhere]">{file.name}<span className="block text-t2 text-ink-2">{sizeWords(file.size)}</span></span>
              <Button size="small" onClick={() => onFiles(files.filter((other) => other !== file))}>Take off<span className="sr-only"> {file.name}</span></Button>
            </li>
          ))}
        </ul>
      ) : null}
      <div className="flex flex-wrap items-center gap-3 pt-3">
        <label htmlFor={id} className={buttonClass({ className: "cursor-pointer focus-within:outline-2 focus-within:outline-offset-2 focus-within:outline-focus" })}>
          Choose photos…
          <input id={id} type="file" multiple accept={PHOTO_ACCEPT} className="sr-only" onChange={(event) => { add(event.target.files); event.target.value = ""; }} />
        </label>
        <span className="text-t2 text-ink-2" role="status">{files.length > 0 ? `${countOf(files.length, "photo")} of ${MAX_REQUEST_PHOTOS}. After a reload choose them again.` : "None chosen."}</span>
      </div>
      {[...refused, ...(error ? [error] : [])].map((sentence) => <p key={sentence} role="alert" className="flex gap-[7px] pt-2 text-t2 font-medium text-block"><Mark kind="block" className="mt-px" /><span className="[overflow-wrap:anywhere]">{sentence}</span></p>)}
    </Part>
  );
}
