"use client";

import { useRouter } from "next/navigation";
import { useState } from "react";
import { Button } from "@/components/ui/button";
import { FormDialog } from "@/components/ui/form-dialog";
import { Input } from "@/components/ui/input";
import { Note } from "@/components/ui/note";
import { TextArea } from "@/components/ui/text-area";
import { useChange } from "@/components/ui/use-change";
import { boardName } from "@/lib/core/board-name";
import { listText } from "@/lib/core/quantity";
import { type FittingBoard, readShelfNumber, shelfNumber, type ShelfList } from "@/lib/core/shelf";
import { fetcher, Refusal, send } from "@/lib/http/send";

/** The board becomes the drive's donor, with the chips whose bus and size are known. */
export function TakeBoard({ board, driveId }: { board: FittingBoard; driveId: string }) {
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const { refusal, busy, attempt } = useChange();
  const known = board.chips.filter((chip) => chip.bus !== null && chip.sizeBytes !== null).map((chip) => chip.designator);
  const unknown = board.chips.filter((chip) => !known.includes(chip.designator)).map((chip) => chip.designator);
  async function take() {
    if (!(await attempt(() => send("POST", `/api/shelf-boards/${board.id}/taking`, { driveId })))) return;
    setOpen(false);
    router.refresh();
  }
  return (
    <>
      <Button size="small" reason={board.reserved === "elsewhere" ? "Kept for another case." : null} aria-label={`Take ${board.name} for this drive`} onClick={() => setOpen(true)}>Take it for this drive…</Button>
      {open ? (
        <FormDialog onClose={() => setOpen(false)} title={`Take ${board.name} for this drive`} description={<>It becomes the donor board <span className="font-mono">{boardName(board)}</span> of this drive and leaves the shelf.</>} action="Take it" busy={busy} refusal={refusal} onSubmit={() => void take()}>
          {board.fit.differences.length > 0 ? <Note kind="caution" title="The board number is equal, but look at the rest."><ul className="list-disc pl-5">{board.fit.differences.map((text) => <li key={text}>{text}</li>)}</ul></Note> : null}
          <p>
            {known.length > 0 ? `${listText(known)} ${known.length === 1 ? "is" : "are"} recorded with it; the supply is left as unknown, so look it up before the clip goes on. ` : ""}
            {unknown.length > 0 ? `${listText(unknown)} ${unknown.length === 1 ? "lacks" : "lack"} bus or size: record ${unknown.length === 1 ? "it" : "them"} on the drive afterwards. ` : ""}
            {board.chips.length === 0 ? "No chip is on record: record them on the drive afterwards. " : ""}
          </p>
          <Note kind="caution" title="Strap and mat on before you touch a board.">Save the donor’s own content before anything is written to it.</Note>
        </FormDialog>
      ) : null}
    </>
  );
}

/** For a lead: a board with another number, by its number on the shelf and with a reason. */
export function TakeByNumber({ driveId }: { driveId: string }) {
  const router = useRouter();
  const [open, setOpen] = useState(false);
  const [[number, reason], set] = useState(["", ""]);
  const { refusal, busy, attempt } = useChange();
  const wanted = readShelfNumber(number);
  async function take() {
    const done = await attempt(async () => {
      const { items } = await fetcher<ShelfList>(`/api/shelf-boards?${new URLSearchParams({ q: shelfNumber(wanted ?? 0) })}`);
      if (!items[0]) throw new Refusal({ status: 404, title: "Not found", detail: `There is no ${shelfNumber(wanted ?? 0)} on the shelf. Check the number on the bag.` });
      await send("POST", `/api/shelf-boards/${items[0].id}/taking`, { driveId, reason: reason.trim() });
    });
    if (!done) return;
    setOpen(false);
    router.refresh();
  }
  return (
    <>
      <span><Button size="small" onClick={() => setOpen(true)}>Take another board by its number…</Button></span>
      {open ? (
        <FormDialog onClose={() => setOpen(false)} title="Take a board with another board number" description="Only a lead can, and only with a reason." action="Take it" busy={busy} refusal={refusal}
          reason={wanted === null ? "Type its number on the shelf." : reason.trim().length < 3 ? "Write why it is taken all the same." : null} onSubmit={() => void take()}>
          <Input label="Number on the shelf" mono autoComplete="off" hint="Such as D-0012" value={number} onChange={(event) => set([event.target.value, reason])} />
          <TextArea label="Reason for taking this donor" hint="Goes into the custody log as you type it." maxLength={2000} value={reason} onChange={(event) => set([number, event.target.value])} />
          <Note kind="block" title="A wrong donor can leave a drive beyond repair.">Compare both boards part by part before you go on.</Note>
        </FormDialog>
      ) : null}
    </>
  );
}
