import "server-only";
import type { Readable } from "node:stream";
import { env } from "@/lib/env";
import * as local from "./local";
import { imagePath } from "./paths";
import * as reduced from "./reduced";
import * as remove from "./remove";
import * as writeOnce from "./write-once";

export type { Arrived } from "./write-once";
export type { ImageState, Look } from "./local";
export { discard, filesArriving } from "./write-once";

/** The byte store of this data folder. Images are named by their SHA-256 in lower-case hex and never change. */
export const receive = (stream: Readable) => writeOnce.receive(env().dataDir, stream);
export const keep = (arrived: writeOnce.Arrived, damaged?: () => Promise<void>) => writeOnce.keep(env().dataDir, arrived, damaged);
/** Where the bytes of an image lie, for the engine's threads. */
export const pathOfImage = (sha256: string) => imagePath(env().dataDir, sha256);
export const imageChunks = (sha256: string) => local.imageChunks(env().dataDir, sha256);
export const imageWindow = (sha256: string, offset: number, length: number) => local.imageWindow(env().dataDir, sha256, offset, length);
export const checkImage = (sha256: string, sizeBytes: number) => local.checkImage(env().dataDir, sha256, sizeBytes);
export const lookAtImage = (sha256: string, sizeBytes: number, passed?: (bytes: number) => Promise<void>) => local.lookAtImage(env().dataDir, sha256, sizeBytes, passed);
export const markOfImage = (sha256: string) => local.markOfImage(env().dataDir, sha256);
export const stateNow = (sha256: string, sizeBytes: number) => local.stateNow(env().dataDir, sha256, sizeBytes);
export const storeIsThere = () => local.storeIsThere(env().dataDir);
export const verifiedStream = (sha256: string) => local.verifiedStream(env().dataDir, sha256);
/** Takes the files of an erased image away; `liesStill` is true while any is left. */
export const removeImage = (sha256: string) => remove.removeImage(env().dataDir, sha256);
export const liesStill = (sha256: string) => remove.liesStill(env().dataDir, sha256);
export const freeBytes = () => local.freeBytes(env().dataDir);
export const clearIncoming = (olderThanMs: number) => local.clearIncoming(env().dataDir, olderThanMs);
/** Copies of photos for the screen, by the digest of the original and their longer edge. */
export const readReduced = (sha256: string, edge: number) => reduced.readReduced(env().dataDir, sha256, edge);
export const writeReduced = (sha256: string, edge: number, bytes: Buffer) => reduced.writeReduced(env().dataDir, sha256, edge, bytes);
export { dropNextKey, keyIdOf, type KeyUse, logKey, makeNextKey, nextKeyId, placeNextKey, sealKey, verifySignature } from "./keys";
export { appendWitness, readWitness, witnessMark } from "./witness-file";
