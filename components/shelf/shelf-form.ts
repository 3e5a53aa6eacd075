import { z } from "zod";
import { shelfBytes, type ShelfRow } from "@/lib/core/shelf";
import { shelfChip, shelfInput } from "@/lib/schemas/shelf";
import { maybe, reason } from "@/lib/schemas/text";

/** The size may be typed with a unit; whatever isn't understood goes on to the schema, which says so. */
const typedSize = z.preprocess((value) => (typeof value === "string" && value.trim() !== "" ? shelfBytes(value) ?? value : value), shelfChip.shape.sizeBytes);
const { reservedFor, ...facts } = shelfInput.shape;
const chips = z.array(shelfChip.extend({ sizeBytes: typedSize }));

export const addForm = z.strictObject({ ...facts, chips, reservedFor });
export const correctForm = z.strictObject({ ...facts, chips, reason: maybe(reason).refine((text) => text !== null, "Give a reason.") });

/** What every form of the shelf asks for, as the fields hold it. */
export interface ShelfFields {
  boardNumber: string;
  revision: string;
  controllerMarking: string;
  motorDriverMarking: string;
  chips: { designator: string; bus: string; sizeBytes: string; package: string; marking: string }[];
  origin: string;
  condition: string;
  place: string;
  note: string;
  /** when a board is added */
  reservedFor: string;
  /** when one is corrected */
  reason: string;
}

export const NO_CHIP = { designator: "", bus: "", sizeBytes: "", package: "", marking: "" };

export function fieldsOf(row: ShelfRow | null): ShelfFields {
  const text = (name: "boardNumber" | "revision" | "controllerMarking" | "motorDriverMarking" | "origin" | "condition" | "place" | "note") => row?.[name] ?? "";
  return {
    boardNumber: text("boardNumber"), revision: text("revision"), controllerMarking: text("controllerMarking"), motorDriverMarking: text("motorDriverMarking"), origin: text("origin"), condition: text("condition"), place: text("place"), note: text("note"),
    chips: (row?.chips ?? []).map((chip) => ({ designator: chip.designator, bus: chip.bus ?? "", sizeBytes: chip.sizeBytes === null ? "" : String(chip.sizeBytes), package: chip.package ?? "", marking: chip.marking ?? "" })), reservedFor: "", reason: "",
  };
}
