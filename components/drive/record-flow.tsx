"use client";

import { useRouter } from "next/navigation";
import { useEffect, useRef, useState } from "react";
import { Dialog } from "@/components/ui/dialog";
import { boardName } from "@/lib/core/board-name";
import { backgroundFetcher } from "@/lib/http/send";
import type { DriveView } from "@/lib/views";
import { BoardStep } from "./board-step";
import { type ChipEnd, ChipStep } from "./chip-step";
import { type DriveProposal, DriveStep } from "./drive-step";
import { boardOf, nextStep, type Step } from "./flow";

interface Given {
  start: Step;
  /** null while the drive itself is the first form */
  drive: DriveView | null;
  caseId: string;
  userId: string;
  /** may take a donor with another board number */
  isLead: boolean;
  proposed?: DriveProposal & { boardNumber?: string; revision?: string };
  onClose(): void;
}

function titleOf(step: Step, drive: DriveView | null): { title: string; description?: string } {
  if (step.kind === "drive") return { title: "Add a drive", description: "Type what the label says, exactly. Enter saves and goes on." };
  if (step.kind === "board") {
    return step.role === "original"
      ? { title: "Add the original board", description: "The customer’s board. Its chips are only ever read." }
      : { title: "Add a donor board", description: "It has to carry the original’s board number." };
  }
  const board = drive && boardOf(drive, step.boardId);
  return { title: board ? `Add a chip on ${board.role === "original" ? "the original" : "the donor"} ${boardName(board)}` : "Add a chip" };
}

/** Drive, original board, chip, donor board, donor chip: one form after the other in one dialog, as far as somebody goes on. */
export function RecordFlow({ start, drive: given, caseId, userId, isLead, proposed = {}, onClose }: Given) {
  const router = useRouter();
  // `turn` counts the forms, so that another chip of the same board begins empty
  const [{ step, drive, turn, fresh }, setAt] = useState({ step: start, drive: given, turn: 0, fresh: 0 });
  const frame = useRef<HTMLDivElement>(null);
  const typed = useRef(false);
  const [driveId] = useState(given?.id ?? null);
  // the page may be older than what was saved a moment ago: a donor's chip would find no original to stand for. A form
  // in which nobody has typed yet begins again with what is so now.
  useEffect(() => {
    if (driveId === null) return;
    let gone = false;
    void backgroundFetcher<DriveView>(`/api/drives/${driveId}`).then((now) => {
      if (gone) return;
      setAt((at) => (at.turn > 0 || JSON.stringify(now.boards) === JSON.stringify(at.drive?.boards) ? at : { ...at, drive: now, fresh: typed.current ? at.fresh : at.fresh + 1 }));
    }, () => undefined);
    return () => { gone = true; };
  }, [driveId]);
  useEffect(() => {
    if (turn > 0 || fresh > 0) frame.current?.querySelector<HTMLElement>("input, select, textarea")?.focus();
  }, [turn, fresh]);

  function close() {
    // what was saved so far shows, also after "Leave it"
    if (turn > 0) router.refresh();
    onClose();
  }
  async function saved(driveId: string, end: ChipEnd) {
    if (end !== "close") {
      const now = await backgroundFetcher<DriveView>(`/api/drives/${driveId}`);
      const next = end === "another" ? step : nextStep(now);
      if (next) return setAt({ step: next, drive: now, turn: turn + 1, fresh });
    }
    router.refresh();
    onClose();
  }

  const shared = { userId, onClose: close };
  const { boardNumber, revision, ...label } = proposed;
  const board = step.kind === "chip" && drive ? boardOf(drive, step.boardId) : null;
  return (
    <Dialog open onOpenChange={(next) => { if (!next) close(); }} {...titleOf(step, drive)}>
      <div ref={frame} key={`${turn}.${fresh}`} onInput={() => { typed.current = true; }}>
        {step.kind === "drive" ? <DriveStep {...shared} caseId={caseId} proposed={label} onSaved={(id, goOn) => saved(id, goOn ? "go-on" : "close")} /> : null}
        {step.kind === "board" && drive ? <BoardStep {...shared} drive={drive} role={step.role} isLead={isLead} proposed={{ ...(boardNumber ? { boardNumber } : {}), ...(revision ? { revision } : {}) }} onSaved={(goOn) => saved(drive.id, goOn ? "go-on" : "close")} /> : null}
        {board && drive ? <ChipStep {...shared} drive={drive} board={board} onSaved={(end) => saved(drive.id, end)} /> : null}
      </div>
    </Dialog>
  );
}
