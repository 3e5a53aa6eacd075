import { describe, expect, it } from "vitest";
import { judgeAgain } from "@/lib/commands/judge-again";
import { setReadAside } from "@/lib/commands/set-read-aside";
import type { Actor } from "@/lib/core/words";
import { ComparisonRow, Read } from "@/models";
import { pathOfImage } from "@/storage";
import { rename } from "node:fs/promises";
import { freshImage, logOf, makeChip, makeUser, readsOf, sha256, stateOf, store } from "../support/factory";

async function notes(actor: Actor, chipId: string): Promise<{ severity: string; message: string }[]> {
  return (await readsOf(actor, chipId, "before")).flatMap((read) => read.findings).filter((one) => one.code === "family-likeness");
}

let count = 0;
/** A board number that no other test has. */
const freshNumber = () => `BX 77-${Date.now().toString(36)}${(count += 1)}`;

/** One byte in forty is another board's own. */
function sibling(image: Buffer, own: number): Buffer {
  return Buffer.from(image.map((value, at) => (at % 40 === own ? value ^ 0x15 : value)));
}

describe("a read beside the same chip of other cases' boards", () => {
  it("is noted when it is unlike a family whose chips are alike, whatever the number's spelling", async () => {
    const technician = await makeUser("technician");
    const [boardNumber, image] = [freshNumber(), freshImage()];
    const spelt = [boardNumber, boardNumber.replace(" ", "").toLowerCase(), ` ${boardNumber.replace("-", "- ")}`.trim()];
    const chips = [];
    for (const [own, name] of spelt.entries()) {
      const chip = await makeChip(technician, { boardNumber: name });
      await store(technician, chip.chipId, "before", sibling(image, own));
      expect(await notes(technician, chip.chipId)).toEqual([]);
      chips.push(chip);
    }
    const other = await makeChip(technician, { boardNumber });
    await store(technician, other.chipId, "before", freshImage());
    expect(await notes(technician, other.chipId)).toEqual([expect.objectContaining({
      severity: "note", message: expect.stringMatching(/^Unlike the same chip of other boards with this number: \d\.\d\d % of its data equal Read 1 of U12, case \d\d-\d{4}, the nearest\.$/),
    })]);
    // a note stands against nothing, and names no customer
    expect(await stateOf(technician, other.chipId)).not.toBe("held");
    expect(JSON.stringify(await logOf(other.driveId))).not.toMatch(/Lindmoor/);
    // what came later changes no earlier judgement
    await Read.update({ engineVersion: "2" }, { where: { chipId: chips[0].chipId } });
    await judgeAgain();
    expect(await notes(technician, chips[0].chipId)).toEqual([]);
  });

  it("is noted when it all but equals one of another case, until that is set aside", async () => {
    const technician = await makeUser("technician");
    const [boardNumber, image] = [freshNumber(), freshImage()];
    const [chip, other] = [await makeChip(technician, { boardNumber }), await makeChip(technician, { boardNumber })];
    const { reads: [first] } = await store(technician, chip.chipId, "before", image);
    const nearly = Buffer.from(image);
    nearly[4000] ^= 0x15;
    const { reads: [second] } = await store(technician, other.chipId, "before", nearly);
    expect(await notes(technician, other.chipId)).toEqual([expect.objectContaining({
      severity: "note", message: `Equals Read 1 of U12, case ${chip.ref}, in all but 1 byte; that board has the same number.`,
    })]);
    // worked out once for a pair of images
    const pairs = () => ComparisonRow.count({ where: { sha256A: [sha256(image), sha256(nearly)].map((hex) => Buffer.from(hex, "hex")) } });
    const kept = await pairs();
    await setReadAside(technician, first.id, { reason: "The clip sat on the wrong board." });
    await Read.update({ engineVersion: "2" }, { where: { id: second.id } });
    await judgeAgain();
    expect(await notes(technician, other.chipId)).toEqual([]);
    expect(await pairs()).toBe(kept);
  });

  it("says nothing of chips that are never alike, of another place on the board, of another size or number", async () => {
    const technician = await makeUser("technician");
    const [boardNumber, image] = [freshNumber(), freshImage()];
    for (const settings of [freshImage(), freshImage(), freshImage()]) {
      const chip = await makeChip(technician, { boardNumber });
      await store(technician, chip.chipId, "before", settings);
      expect(await notes(technician, chip.chipId)).toEqual([]);
    }
    const apart = await makeChip(technician, { boardNumber: freshNumber() });
    await store(technician, apart.chipId, "before", image);
    const elsewhere = await makeChip(technician, { boardNumber: freshNumber() });
    const nearly = Buffer.from(image);
    nearly[4000] ^= 0x15;
    await store(technician, elsewhere.chipId, "before", nearly);
    expect(await notes(technician, elsewhere.chipId)).toEqual([]);
  });

  it("is stored all the same when the other image is gone from the store", async () => {
    const technician = await makeUser("technician");
    const [boardNumber, image] = [freshNumber(), freshImage()];
    const [chip, other] = [await makeChip(technician, { boardNumber }), await makeChip(technician, { boardNumber })];
    await store(technician, chip.chipId, "before", image);
    const file = pathOfImage(sha256(image));
    await rename(file, `${file}.away`);
    const nearly = Buffer.from(image);
    nearly[4000] ^= 0x15;
    await store(technician, other.chipId, "before", nearly);
    expect(await notes(technician, other.chipId)).toEqual([]);
    await rename(`${file}.away`, file);
  });
});
