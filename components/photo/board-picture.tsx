"use client";

import Image from "next/image";
import type { KeyboardEvent, MouseEvent, ReactNode } from "react";
import type { BoardRole } from "@/lib/core/words";
import type { PhotoView } from "@/lib/views";
import { pageSrc } from "./photo-words";

/** A chip and where it sits on the picture, in thousandths from the left and from the top; null until it is placed. */
export interface PlacedChip {
  id: string;
  designator: string;
  place: { x: number; y: number } | null;
}

export interface Placing {
  /** the chip that is being placed, and where it would be put now */
  chipId: string;
  at: { x: number; y: number };
  onMove(at: { x: number; y: number }): void;
}

/** px; a tall picture would push the chips below the window */
const HIGHEST = 480;
const within = (n: number) => Math.min(1000, Math.max(0, Math.round(n)));
const STEPS: Record<string, [number, number]> = { ArrowLeft: [-1, 0], ArrowRight: [1, 0], ArrowUp: [0, -1], ArrowDown: [0, 1] };

/**
 * A board's newest photo as the ground on which its chips stand, each with its plate. With `placing` a click puts that chip
 * where it fell, and arrow keys move it (ten thousandths a step, fifty with Shift). Without a photo: the drawing.
 */
export function BoardPicture({ photo, chips, role, name, placing, fallback }: {
  photo: PhotoView | null;
  chips: readonly PlacedChip[];
  role: BoardRole;
  /** "the original board BX 40-3179 rev C" */
  name: string;
  placing?: Placing;
  fallback: ReactNode;
}) {
  if (!photo || photo.kind !== "photo" || !photo.width || !photo.height) return fallback;
  const scale = Math.min(1, 1600 / Math.max(photo.width, photo.height));
  // its room is known before its bytes are here: nothing below it moves
  const room = { width: `min(100%, ${Math.round(Math.min(photo.width * scale, (HIGHEST * photo.width) / photo.height))}px)` };
  function onClick(event: MouseEvent<HTMLDivElement>) {
    const box = event.currentTarget.getBoundingClientRect();
    placing?.onMove({ x: within(((event.clientX - box.left) / box.width) * 1000), y: within(((event.clientY - box.top) / box.height) * 1000) });
  }
  function onKeyDown(event: KeyboardEvent<HTMLElement>) {
    const step = STEPS[event.key];
    if (!step || !placing) return;
    event.preventDefault();
    const by = event.shiftKey ? 50 : 10;
    placing.onMove({ x: within(placing.at.x + step[0] * by), y: within(placing.at.y + step[1] * by) });
  }
  return (
    <div className="board-photo" role="group" aria-label={`Photo of ${name} with its chips`}>
      <div className={`board-photo-ground ${placing ? "is-placing" : ""}`} style={room} onClick={placing ? onClick : undefined}>
        <Image src={pageSrc(photo)} alt={photo.caption ?? `Photo of ${name}`} width={Math.round(photo.width * scale)} height={Math.round(photo.height * scale)} unoptimized loading="lazy" draggable={false} />
        {chips.map((chip) => {
          const moving = placing?.chipId === chip.id;
          const at = moving ? placing.at : chip.place;
          if (!at) return null;
          const style = { left: `${at.x / 10}%`, top: `${at.y / 10}%` };
          const plate = <span className={`plate plate-${role}`}>{chip.designator}</span>;
          if (moving) {
            return (
              <button key={chip.id} type="button" className="on-photo is-moving" style={style} onKeyDown={onKeyDown} onClick={(event) => event.stopPropagation()}
                aria-label={`${chip.designator}, ${Math.round(at.x / 10)} percent from the left, ${Math.round(at.y / 10)} from the top. Arrow keys move it.`}>{plate}</button>
            );
          }
          return placing ? <span key={chip.id} className="on-photo" style={style}>{plate}</span> : <a key={chip.id} href={`/chips/${chip.id}`} className="on-photo" style={style} aria-label={`${chip.designator}, ${role}`}>{plate}</a>;
        })}
      </div>
    </div>
  );
}
