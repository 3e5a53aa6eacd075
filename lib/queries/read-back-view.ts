import { compareIfStored } from "@/lib/commands/compare-images";
import { readsText } from "@/lib/core/quantity";
import { type Actor, readName, seatingLetter } from "@/lib/core/words";
import type { ChipView, ReadBackView, ReadView } from "@/lib/views";
import { Read } from "@/models";
import { chipView } from "./chip-view";
import { comparisonOf } from "./compare";
import { seenBy } from "./seen-by";
import { type StripImage, stripStack } from "./strips";

const DRAWN = 5;

/** The approved image over the counted read-backs of the latest transfer; null until there is one of each. */
export async function readBackView(actor: Actor, asked: ChipView): Promise<ReadBackView | null> {
  const { chip, holders, approved, backs } = await latestTransfer(actor, asked);
  if (!approved || backs.length === 0) return null;
  const differing: ReadBackView["backs"] = [];
  for (const back of backs) differing.push({ number: back.number, name: nameOf(back), differs: await differs(approved, back) });
  const rows = [{ ...image(approved), name: "Approved", note: `${readsText(holders.map((r) => r.number))}${holders.every((r) => r.derived) ? ", composite" : ""}` }, ...backs.slice(-DRAWN).map(image)];
  return { chipId: chip.id, backs: differing, stack: await stripStack(rows, chip.sizeBytes) };
}

/** The approved image and one of those read-backs for the compare page; null when either isn't there. */
export async function readBackComparison(actor: Actor, asked: ChipView, number: number) {
  const { chip, approved, backs } = await latestTransfer(actor, asked);
  const back = backs.find((r) => r.number === number);
  if (!approved || !back) return null;
  const [a, b] = [await Read.findByPk(approved.id), await Read.findByPk(back.id)];
  return a && b ? seenBy(actor, await comparisonOf([a, b], chip.sizeBytes)) : null;
}

async function latestTransfer(actor: Actor, asked: ChipView) {
  const chip = asked.boardRole === "original" || !asked.pair || asked.transfers.length === 0 ? asked : await chipView(actor, asked.pair.id);
  const holders = chip.reads.filter((r) => r.stage === "before" && r.counted && r.sha256 === chip.approval?.sha256);
  const approved = holders.find((r) => r.imageSound);
  const latest = chip.transfers.at(-1);
  const backs = chip.reads.filter((r) => r.stage === "after" && r.counted && r.imageSound && r.transferId === latest?.id);
  return { chip, holders, approved, backs };
}

const nameOf = (read: ReadView) => readName(read.stage, read.number);

function image(read: ReadView): StripImage {
  return { readId: read.id, name: nameOf(read), note: `seating ${seatingLetter(read.seating)}`, sha256: read.sha256, sizeBytes: read.sizeBytes };
}

async function differs(approved: ReadView, back: ReadView): Promise<number | "other-size"> {
  if (approved.sha256 === back.sha256) return 0;
  if (approved.sizeBytes !== back.sizeBytes) return "other-size";
  return (await compareIfStored(approved, back))?.differingBytes ?? "other-size";
}
