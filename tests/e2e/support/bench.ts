import { createHash, randomBytes } from "node:crypto";
import { likeFirmware } from "../../support/firmware";
import type { Stage } from "@/lib/core/words";
import type { ReadView, StateView } from "@/lib/views";
import { type Answer, call, done } from "./station";

export const sha256Of = (bytes: Uint8Array): string => createHash("sha256").update(bytes).digest("hex");

export interface Pair {
  caseId: string;
  driveId: string;
  boardId: string;
  chipId: string;
  donorBoardId: string;
  donorChipId: string;
}

/** A case with one drive, both boards and a pair of chips, by bench token. */
export async function makePair(token: string, { customer, sizeBytes }: { customer: string; sizeBytes: number }): Promise<Pair> {
  const post = <T>(path: string, json: object) => done<T>("POST", path, { token, json });
  const { id: caseId } = await post<{ id: string }>("/api/cases", { customer: { name: customer, email: "api@apitests.example" }, damage: "Power surge" });
  const { id: driveId } = await post<{ id: string }>(`/api/cases/${caseId}/drives`, { partNumber: "PN 9100-0002-B" });
  const board = { boardNumber: "BX 91-0002", revision: "rev A" };
  const { id: boardId } = await post<{ id: string }>(`/api/drives/${driveId}/boards`, { role: "original", ...board });
  const { id: donorBoardId } = await post<{ id: string }>(`/api/drives/${driveId}/boards`, { role: "donor", ...board });
  const facts = { designator: "U7", bus: "spi", sizeBytes, sizeSource: "marking", supplyMillivolts: 3300 };
  const { id: chipId } = await post<{ id: string }>(`/api/boards/${boardId}/chips`, facts);
  const { id: donorChipId } = await post<{ id: string }>(`/api/boards/${donorBoardId}/chips`, { ...facts, pairedWith: chipId });
  return { caseId, driveId, boardId, chipId, donorBoardId, donorChipId };
}

export interface FileToSend {
  bytes: Uint8Array<ArrayBuffer>;
  name?: string;
}

/** The multipart body of an upload; `fields` override or add to what a bench always sends. */
export function uploadForm(fields: Record<string, string>, files: FileToSend[]): FormData {
  const form = new FormData();
  for (const [name, value] of Object.entries({ stage: "before", seating: "1", reader: "R2", ...fields })) form.append(name, value);
  for (const [index, { bytes, name }] of files.entries()) form.append("file", new Blob([bytes]), name ?? `read${index + 1}.bin`);
  return form;
}

export function upload(token: string, chipId: string, fields: Record<string, string>, files: FileToSend[], more: { headers?: Record<string, string>; base?: string } = {}): Promise<Answer> {
  return call("POST", `/api/chips/${chipId}/reads`, { token, body: uploadForm(fields, files), ...more });
}

export interface Stored {
  reads: ReadView[];
  chip: StateView;
}

export async function store(token: string, chipId: string, stage: Stage, seating: number, images: Uint8Array<ArrayBuffer>[]): Promise<Stored> {
  return done("POST", `/api/chips/${chipId}/reads`, {
    token, body: uploadForm({ stage, seating: String(seating) }, images.map((bytes) => ({ bytes }))),
  });
}

export const randomImage = (sizeBytes: number): Uint8Array<ArrayBuffer> => likeFirmware(new Uint8Array(randomBytes(sizeBytes)));

export interface Ready extends Pair {
  image: Uint8Array<ArrayBuffer>;
  sha256: string;
  /** the three reads of the original, in order */
  reads: ReadView[];
}

/** A chip that only waits for its approval: donor saved, three equal reads in two seatings. */
export async function makeReady(token: string, { customer, sizeBytes = 65_536 }: { customer: string; sizeBytes?: number }): Promise<Ready> {
  const pair = await makePair(token, { customer, sizeBytes });
  const own = randomImage(sizeBytes);
  const image = randomImage(sizeBytes);
  await store(token, pair.donorChipId, "donor", 1, [own, own]);
  const first = await store(token, pair.chipId, "before", 1, [image, image]);
  const second = await store(token, pair.chipId, "before", 2, [image]);
  return { ...pair, image, sha256: sha256Of(image), reads: [...first.reads, ...second.reads] };
}

export function approve(token: string, chip: Pair, sha256: string, more: { headers?: Record<string, string>; base?: string } = {}): Promise<Answer> {
  return call("POST", `/api/chips/${chip.chipId}/approval`, { token, json: { sha256, donorChipId: chip.donorChipId, statement: "Three equal reads in two seatings." }, ...more });
}

export interface LogEntry {
  seq: number;
  body: string;
  action: string;
}

export async function custodyOf(token: string, driveId: string): Promise<LogEntry[]> {
  return (await done<{ entries: LogEntry[] }>("GET", `/api/drives/${driveId}/custody`, { token })).entries;
}

export interface FlatChip extends StateView {
  reads: ReadView[];
  approvals: { id: string; sha256: string }[];
  transfers: { id: string }[];
}

export const chipOf = (token: string, chipId: string): Promise<FlatChip> => done("GET", `/api/chips/${chipId}`, { token });
