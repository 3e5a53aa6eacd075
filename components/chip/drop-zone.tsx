"use client";

import { useRef, useState, type DragEvent, type ReactNode } from "react";
import { Button } from "@/components/ui/button";

/** An empty chip socket, dashed: files by drag or by the picker, several at once. */
export function DropZone({ title, children, onFiles }: { title: string; children: ReactNode; onFiles(files: File[]): void }) {
  const picker = useRef<HTMLInputElement>(null);
  const [over, setOver] = useState(false);
  function onDrop(event: DragEvent) {
    event.preventDefault();
    setOver(false);
    const files = [...event.dataTransfer.files];
    if (files.length > 0) onFiles(files);
  }
  return (
    <div onDragOver={(event) => { event.preventDefault(); setOver(true); }} onDragLeave={() => setOver(false)} onDrop={onDrop}
      className={`grid grid-cols-[auto_1fr_auto] items-center gap-x-[18px] gap-y-1.5 border-2 px-5 py-[18px] phone:grid-cols-[auto_1fr] ${over ? "border-solid border-green bg-green-wash" : "border-dashed border-rule-2 bg-sheet"}`}>
      <svg viewBox="0 0 60 52" width="60" height="52" aria-hidden="true">
        <path fill="var(--copper-2)" d="M10 3h5v9h-5zM21 3h5v9h-5zM33 3h5v9h-5zM44 3h5v9h-5zM10 40h5v9h-5zM21 40h5v9h-5zM33 40h5v9h-5zM44 40h5v9h-5z" />
        <path d="M4 12h51v28H4z" fill="none" stroke="var(--ink-2)" strokeWidth="2" strokeDasharray="4 3" />
        <circle cx="11" cy="33" r="2.4" fill="var(--ink-2)" />
        <path d="M29.5 18v11M25 25l4.500 4.500L34 25" fill="none" stroke="var(--ink)" strokeWidth="2" />
      </svg>
      <div><b className="text-t4">{title}</b><p className="text-ink-2">{children}</p></div>
      <input ref={picker} type="file" multiple className="sr-only" tabIndex={-1} aria-label="Chip image files" onChange={(event) => {
        const files = [...(event.target.files ?? [])];
        // so that the same file can be chosen once more
        event.target.value = "";
        if (files.length > 0) onFiles(files);
      }} />
      <Button onClick={() => picker.current?.click()} className="phone:col-span-full">Choose files</Button>
    </div>
  );
}
