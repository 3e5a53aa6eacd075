"use client";

import { useRef, useState, type DragEvent } from "react";
import { Button } from "@/components/ui/button";

/** A dashed drawer for one file: by drag or by the picker. */
export function DropOne({ onFile }: { onFile(file: File): void }) {
  const picker = useRef<HTMLInputElement>(null);
  const [over, setOver] = useState(false);
  function onDrop(event: DragEvent) {
    event.preventDefault();
    setOver(false);
    const [file] = event.dataTransfer.files;
    if (file) onFile(file);
  }
  return (
    <div onDragOver={(event) => { event.preventDefault(); setOver(true); }} onDragLeave={() => setOver(false)} onDrop={onDrop}
      className={`grid grid-cols-[auto_1fr_auto] items-center gap-x-[18px] gap-y-2 border-2 px-5 py-[18px] phone:grid-cols-[auto_1fr] phone:px-4 ${over ? "border-solid border-green bg-green-wash" : "border-dashed border-rule-2 bg-sheet"}`}>
      <svg viewBox="0 0 60 52" width="60" height="52" aria-hidden="true">
        <path d="M4 9h20l5 6h27v32H4z" fill="none" stroke="var(--ink-2)" strokeWidth="2" strokeDasharray="4 3" />
        <circle cx="30" cy="31" r="9" fill="none" stroke="var(--copper-2)" strokeWidth="3" />
        <path d="M21 31H9M39 31h12" fill="none" stroke="var(--copper-2)" strokeWidth="3" />
      </svg>
      <div><b className="text-t4">Drop a case bundle or a chip image here</b><p className="text-ink-2">The bundle as it came, a .zip. Of any other file you get size, CRC-32 and SHA-256.</p></div>
      <input ref={picker} type="file" className="sr-only" tabIndex={-1} aria-label="Case bundle or chip image" onChange={(event) => {
        const [file] = event.target.files ?? [];
        if (file) onFile(file);
        // so that the same file can be chosen once more
        event.target.value = "";
      }} />
      <Button variant="lead" onClick={() => picker.current?.click()} className="phone:col-span-full">Choose a file</Button>
    </div>
  );
}
