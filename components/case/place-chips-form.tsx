"use client";

import { useRouter } from "next/navigation";
import { type KeyboardEvent, type MouseEvent, useState } from "react";
import { BoardPicture } from "@/components/photo/board-picture";
import { Button } from "@/components/ui/button";
import { FormDialog } from "@/components/ui/form-dialog";
import { Input } from "@/components/ui/input";
import { Select } from "@/components/ui/select";
import { useChange } from "@/components/ui/use-change";
import { boardName } from "@/lib/core/board-name";
import { countOf } from "@/lib/core/quantity";
import { send } from "@/lib/http/send";
import type { BoardView, PhotoView } from "@/lib/views";
import { BoardDrawing } from "./board-drawing";
import { placeChips } from "./board-place";

type Place = { x: number; y: number };
export interface Given {
  board: BoardView;
  original: BoardView | null;
  /** a photo of the board; the drawing stands in for it */
  photo: PhotoView | null;
}

const REASON = "Placed on the picture";
const MIDDLE: Place = { x: 500, y: 500 };
const STEPS: Record<string, [number, number]> = { ArrowLeft: [-1, 0], ArrowRight: [1, 0], ArrowUp: [0, -1], ArrowDown: [0, 1] };
const within = (n: number) => Math.min(1000, Math.max(0, Math.round(n)));
const same = (a: Place | null, b: Place | null) => a?.x === b?.x && a?.y === b?.y;

export function PlaceChipsForm({ board, original, photo, onClose }: Given & { onClose(): void }) {
  const router = useRouter();
  const { refusal, busy, attempt } = useChange();
  const [chosen, setChosen] = useState(() => (board.chips.find((chip) => !chip.place) ?? board.chips[0]).id);
  const [moved, setMoved] = useState<Readonly<Record<string, Place | null>>>({});
  const placeOf = (chip: BoardView["chips"][number]) => (chip.id in moved ? moved[chip.id] : chip.place);
  const chips = board.chips.map((chip) => ({ ...chip, place: placeOf(chip) }));
  const chip = chips.find((one) => one.id === chosen) ?? chips[0];
  const at = chip.place ?? MIDDLE;
  const changed = board.chips.filter((one) => !same(one.place, placeOf(one)));
  const put = (place: Place | null) => setMoved((before) => ({ ...before, [chip.id]: place }));
  const name = `the ${board.role} board ${boardName(board)}`;

  async function save() {
    const done = await attempt(async () => {
      for (const one of changed) {
        const place = placeOf(one);
        await send("PATCH", `/api/chips/${one.id}`, { changes: { placeX: place?.x ?? null, placeY: place?.y ?? null }, reason: place ? REASON : "Taken off the picture" });
      }
    });
    router.refresh();
    if (done) onClose();
  }
  return (
    <FormDialog onClose={onClose} title={`Place the chips of ${boardName(board)}`} description={`Click where the chip sits on the ${photo ? "photo" : "drawing"}, or move it by the arrow keys, with Shift in larger steps.`}
      action={changed.length > 0 ? `Record ${countOf(changed.length, "place")}` : "Record the places"} busy={busy} refusal={refusal} reason={changed.length > 0 ? null : "Nothing was moved yet."} onSubmit={() => void save()}>
      <Select label="Chip" options={chips.map((one) => ({ value: one.id, label: `${one.designator}${one.place ? "" : ", not placed yet"}` }))} value={chip.id} onChange={(event) => setChosen(event.target.value)} />
      <BoardPicture photo={photo} chips={chips} role={board.role} name={name} placing={{ chipId: chip.id, at, onMove: put }}
        fallback={<DrawingPad board={{ ...board, chips }} original={board.role === "donor" ? original : null} chip={chip} at={at} onMove={put} />} />
      <div className="grid grid-cols-2 gap-4">
        <PlaceField key={`${chip.id} x`} label="From the left, 0 to 1000" value={chip.place?.x ?? null} onValue={(x) => put({ ...at, x })} />
        <PlaceField key={`${chip.id} y`} label="From the top, 0 to 1000" value={chip.place?.y ?? null} onValue={(y) => put({ ...at, y })} />
      </div>
      {chip.place ? <div><Button size="small" variant="text" onClick={() => put(null)}>Take {chip.designator} off the picture</Button></div> : null}
    </FormDialog>
  );
}

/** One number of a place. What is half typed stays as it is typed; the place moves with each whole number. */
function PlaceField({ label, value, onValue }: { label: string; value: number | null; onValue(n: number): void }) {
  const [text, setText] = useState<string | null>(null);
  return (
    <Input label={label} inputMode="numeric" autoComplete="off" value={text ?? (value === null ? "" : String(value))} onBlur={() => setText(null)}
      onChange={(event) => {
        setText(event.target.value);
        if (/^\d{1,4}$/.test(event.target.value)) onValue(within(Number(event.target.value)));
      }} />
  );
}

/** Our drawing as the ground: a click puts the chip there, arrow keys move it. */
function DrawingPad({ board, original, chip, at, onMove }: { board: BoardView; original: BoardView | null; chip: { id: string; designator: string; place: Place | null }; at: Place; onMove(at: Place): void }) {
  function onClick(event: MouseEvent<HTMLDivElement>) {
    const box = event.currentTarget.getBoundingClientRect();
    onMove({ x: within(((event.clientX - box.left) / box.width) * 1000), y: within(((event.clientY - box.top) / box.height) * 1000) });
  }
  function onKeyDown(event: KeyboardEvent<HTMLDivElement>) {
    const step = STEPS[event.key];
    if (!step) return;
    event.preventDefault();
    const by = event.shiftKey ? 50 : 10;
    onMove({ x: within(at.x + step[0] * by), y: within(at.y + step[1] * by) });
  }
  const spots = placeChips(board.role === "original" ? board : original, board.role === "donor" ? board : null);
  return (
    <div role="slider" tabIndex={0} aria-label={`Place of ${chip.designator} on the drawing`} aria-valuemin={0} aria-valuemax={1000} aria-valuenow={at.x}
      aria-valuetext={chip.place ? `${Math.round(at.x / 10)} percent from the left, ${Math.round(at.y / 10)} from the top` : "Not placed yet"} className="place-pad" onClick={onClick} onKeyDown={onKeyDown}>
      <div aria-hidden="true"><BoardDrawing board={board} spots={spots} still moving={chip.id} /></div>
    </div>
  );
}
