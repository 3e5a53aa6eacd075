import { createHash } from "node:crypto";
import { Readable } from "node:stream";
import { handOutName } from "@/lib/core/hand-out-name";
import { may } from "@/lib/core/policy";
import { FORMAT_ENDING } from "@/lib/core/text-format";
import type { Actor, Format } from "@/lib/core/words";
import { AppError } from "@/lib/errors";
import { Approval, inTransaction } from "@/models";
import { engine } from "@/lib/engine/pool";
import { pathOfImage, verifiedStream } from "@/storage";
import { appendEntry, lockChain } from "./append-entry";
import { requireCleanChain } from "./chain-gate";
import { driveLetter, readFor } from "./place";
import { allow } from "./refuse";
import { reportImage, requireSoundImage } from "./report-image";

export interface HandOutInput {
  reason?: string | null;
  /** raw when left out */
  format?: Format;
}

export interface HandOut {
  sha256: string;
  sizeBytes: number;
  /** a name of ours, never the uploader's */
  fileName: string;
}

/** Records that an image leaves the house, before its first byte leaves: what, to whom, why. */
export async function handOutImage(actor: Actor, readId: string, input: HandOutInput): Promise<HandOut> {
  const { read, place } = await readFor(actor, readId);
  const approval = await Approval.findOne({ where: { chipId: read.chipId, revokedAt: null, sha256: read.sha256 } });
  const free = read.stage === "donor" ? "the donor's own content" : approval && read.stage === "before" ? "the approved image, for writing" : null;
  if (free) allow(actor, "read.hand-out-approved");
  else allow(actor, "read.hand-out-any");
  if (!free || !may(actor, "transfer.record")) {
    if (!input.reason) throw new AppError("does-not-fit", "Give a reason for taking this image out; it goes into the custody log.", { errors: [{ path: "reason", message: "Give a reason." }] });
  }
  await requireCleanChain(place.drive.id);
  const sha256 = read.sha256.toString("hex");
  await requireSoundImage(sha256, read.sizeBytes, "hand-out");
  await inTransaction(async (tx) => {
    await lockChain(tx, place.drive.id);
    // asked again under the lock: a revocation that came meanwhile counts
    const now = approval && read.stage === "before" ? await Approval.findByPk(approval.id, { transaction: tx }) : null;
    if (now?.revokedAt) {
      throw new AppError("rule-against", "The approval of this image was revoked just now: it is no longer cleared. See the chip's page for what to do.");
    }
    await appendEntry(tx, place.drive.id, actor, "image.handed-out", { type: "read", id: read.id }, {
      read: { id: read.id, stage: read.stage, number: read.number }, chip: { id: place.chip.id, designator: place.chip.designator },
      sha256, sizeBytes: read.sizeBytes, purpose: free ?? "another image, with a reason", to: { id: actor.id, name: actor.name }, reason: input.reason ?? null,
      ...(input.format && input.format !== "raw" ? { format: input.format } : {}),
    });
  });
  const image = { caseRef: place.case.ref, drive: driveLetter(place.drive), designator: place.chip.designator, stage: read.stage, number: read.number, sha256 };
  return { sha256, sizeBytes: read.sizeBytes, fileName: handOutName(image, FORMAT_ENDING[input.format ?? "raw"]) };
}

/**
 * Recorded first, then the bytes, checked while they flow: a mismatch breaks the transfer and is written down. As text the
 * image has been read whole and checked just before; `fileSha256` is the digest of what leaves.
 */
export async function openHandedOut(actor: Actor, readId: string, input: HandOutInput): Promise<HandOut & { stream: Readable; fileSha256: string; fileBytes: number }> {
  const handOut = await handOutImage(actor, readId, input);
  if (input.format && input.format !== "raw") {
    const text = Buffer.from(await engine("encode", { file: pathOfImage(handOut.sha256), format: input.format, base: 0 }));
    return { ...handOut, stream: Readable.from([text]), fileSha256: createHash("sha256").update(text).digest("hex"), fileBytes: text.length };
  }
  const stream = verifiedStream(handOut.sha256);
  stream.once("error", () => {
    void reportImage(handOut.sha256, "damaged", "hand-out").catch((error: unknown) => console.error("could not record a damaged image:", error));
  });
  return { ...handOut, stream, fileSha256: handOut.sha256, fileBytes: handOut.sizeBytes };
}
