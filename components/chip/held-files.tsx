import { Button } from "@/components/ui/button";
import { Note } from "@/components/ui/note";
import { countOf } from "@/lib/core/quantity";
import type { Format } from "@/lib/core/words";
import { type FileLook, FORMAT_WORD, heldBecause } from "./file-look";

/** Files that wait for the form: each with what it looks like, and a button that takes the proposal up. */
export function HeldFiles({ held, format, window, incomplete, onFormat, onSend, onDrop }: {
  held: readonly FileLook[];
  format: Format;
  /** null while base and size are not both typed */
  window: { base: number; size: number } | null;
  /** the form was asked and lacks something */
  incomplete: boolean;
  onFormat(format: Format): void;
  onSend(): void;
  onDrop(): void;
}) {
  if (held.length === 0) return null;
  const proposals = [...new Set(held.filter((one) => one.looks !== format).map((one) => one.looks))];
  const mixed = new Set(held.map((one) => one.looks)).size > 1;
  const stuck = held.some((one) => one.problem && one.looks === format);
  const lacks = format !== "raw" && !window;
  const stop = stuck ? "Take these off the list first." : lacks ? "Give base, size and fill first." : null;
  return (
    <Note kind={stuck ? "caution" : "note"} title={held.length === 1 ? `${held[0].file.name} waits.` : `${countOf(held.length, "file")} wait.`} role="status">
      <ul className="grid gap-1">
        {held.map((one, i) => {
          const why = heldBecause(one, format, window);
          return why || held.length > 1 ? <li key={`${i} ${one.file.name}`} className="[overflow-wrap:anywhere]">{held.length > 1 ? <code>{one.file.name}</code> : null} {why ?? "Ready."}</li> : null;
        })}
      </ul>
      {mixed ? <p>They are of different formats. Send each format by itself.</p> : null}
      {incomplete ? <p>Complete the form, then send.</p> : null}
      <span className="mt-1.5 flex flex-wrap items-center gap-x-4 gap-y-1.5">
        {proposals.map((looks) => <Button key={looks} size="small" onClick={() => onFormat(looks)}>Take as {looks === "raw" ? "raw binary" : FORMAT_WORD[looks]}</Button>)}
        <Button size="small" reason={stop} onClick={onSend}>{proposals.length > 0 ? `Send as ${format === "raw" ? "raw binary" : FORMAT_WORD[format]}` : "Send now"}</Button>
        <Button size="small" variant="text" onClick={onDrop}>Take off the list</Button>
      </span>
    </Note>
  );
}
