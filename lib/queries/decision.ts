import { compareImages } from "@/lib/commands/compare-images";
import { agreement, openFindings } from "@/lib/core/chip-state";
import { placeText } from "@/lib/core/strip";
import type { Actor } from "@/lib/core/words";
import type { ChipView, DecisionView, ReadView } from "@/lib/views";
import { chipView } from "./chip-view";
import { driveView } from "./drives";
import { type StripImage, stripStack } from "./strips";

/** Everything the decision sheet shows about one original's chip. */
export async function decisionView(actor: Actor, chipId: string): Promise<DecisionView> {
  const chip = await chipView(actor, chipId);
  const before = chip.reads.filter((r) => r.stage === "before");
  const image = imageOf(chip, before);
  const donor = await donorOf(actor, chip);
  const held = before.find((r) => r.counted && r.imageSound && r.sha256 === image?.sha256);
  const own = donor?.own.find((r) => r.imageSound);
  return {
    chip, image, donor,
    open: openFindings({ policy: chip.policy, reads: before.map((r) => ({ ...r, operatorId: r.operator.id })) }),
    stack: held && own ? await stripStack([drawn(held, "New", "the image"), drawn(own, chip.transfers.some((t) => t.donorChipId === own.chipId) ? "Was" : "Now", `donor ${donor?.chip.designator ?? ""}`)], chip.sizeBytes) : null,
    donorDiffers: held && own ? (await compareImages(held, own)).differingBytes : null,
    setAside: held ? await Promise.all(before.filter((r) => !r.counted && r.imageSound).map((r) => differenceOf(held, r, chip.sizeBytes))) : [],
  };
}

function imageOf(chip: ChipView, before: ReadView[]): DecisionView["image"] {
  const { groups, largest } = agreement(before.map((r) => ({ ...r, operatorId: r.operator.id })));
  const group = groups.find((g) => g.sha256 === chip.approval?.sha256) ?? largest;
  const read = before.find((r) => r.counted && r.sha256 === group?.sha256);
  return group && read ? { sha256: group.sha256, crc32: read.crc32, sizeBytes: read.sizeBytes, reads: group.reads, seatings: group.seatings } : null;
}

async function donorOf(actor: Actor, chip: ChipView): Promise<DecisionView["donor"]> {
  const { pair } = chip;
  if (!pair) return null;
  const { boards } = await driveView(actor, chip.drive.id);
  const board = boards.find((b) => b.id === pair.boardId);
  const summary = board?.chips.find((c) => c.id === pair.id);
  return board && summary ? { board, chip: summary, own: chip.reads.filter((r) => r.stage === "donor" && r.counted) } : null;
}

function drawn(read: ReadView, name: string, note: string): StripImage {
  return { readId: read.id, name, note, sha256: read.sha256, sizeBytes: read.sizeBytes };
}

async function differenceOf(held: ReadView, read: ReadView, sizeBytes: number): Promise<DecisionView["setAside"][number]> {
  const { differingBytes, first, last } = await compareImages(held, read);
  return { read, differingBytes, place: first === null || last === null ? null : placeText(first, last, Math.max(sizeBytes, read.sizeBytes)) };
}
