import { describe, expect, it } from "vitest";
import { confirmHandOver } from "@/lib/commands/confirm-hand-over";
import { handOverItem } from "@/lib/commands/hand-over-item";
import { itemsOfDrive, placedItems, waitingFor } from "@/lib/queries/items";
import type { HandOverInput } from "@/lib/schemas/hand-over";
import type { Actor } from "@/lib/core/words";
import { Case } from "@/models";
import { makeChip, makeUser } from "../support/factory";
import { logged, refusal } from "../support/bench-steps";

const FROM = { person: "Mira Hollis", place: "Bench 2" };

async function handOver(giver: Actor, driveId: string, to: HandOverInput["to"], more: Partial<HandOverInput> = {}) {
  return handOverItem(giver, driveId, { item: { type: "drive", id: driveId }, from: FROM, to, condition: "In its bag, seal unbroken", sealNumber: "S-4411", ...more });
}

describe("a hand-over to somebody with an account", () => {
  it("counts once they have confirmed, and both steps are in the log with both parties", async () => {
    const [giver, receiver] = [await makeUser("technician"), await makeUser("technician")];
    const { driveId } = await makeChip(giver);
    const to = { person: receiver.name, place: "Safe 1", userId: receiver.id };
    const { id } = await handOver(giver, driveId, to);
    const before = (await itemsOfDrive(giver, driveId)).items[0];
    expect([before.at, before.open?.to.place]).toEqual([null, "Safe 1"]);
    expect((await waitingFor(receiver)).items.map((one) => one.handOver.id)).toEqual([id]);
    await confirmHandOver(receiver, id, { received: true });
    const after = (await itemsOfDrive(giver, driveId)).items[0];
    expect([after.at?.to, after.open]).toEqual([{ person: receiver.name, place: "Safe 1" }, null]);
    expect((await waitingFor(receiver)).items).toEqual([]);
    const parties = { from: FROM, to: { person: receiver.name, place: "Safe 1" }, condition: "In its bag, seal unbroken", sealNumber: "S-4411" };
    expect(await logged(driveId, "item.handed-over")).toMatchObject([parties]);
    expect(await logged(driveId, "item.received")).toMatchObject([parties]);
  });

  it("refuses a confirmation by anybody else, the giver included", async () => {
    const [giver, receiver, lead] = [await makeUser("technician"), await makeUser("technician"), await makeUser("lead")];
    const { driveId } = await makeChip(giver);
    const { id } = await handOver(giver, driveId, { person: receiver.name, place: "Safe 1", userId: receiver.id });
    for (const other of [giver, lead]) expect(await refusal(confirmHandOver(other, id, { received: true, text: "I saw it there." }))).toMatchObject({ status: 403 });
    expect(await refusal(confirmHandOver(await makeUser("auditor"), id, { received: true }))).toMatchObject({ status: 403 });
  });

  it("refuses a second hand-over while one waits, and a second confirmation", async () => {
    const [giver, receiver] = [await makeUser("technician"), await makeUser("lead")];
    const { driveId } = await makeChip(giver);
    const { id } = await handOver(giver, driveId, { person: receiver.name, place: "Safe 1", userId: receiver.id });
    expect(await refusal(handOver(giver, driveId, { person: "Edda Finch", place: "Counter" }))).toMatchObject({ status: 409, detail: expect.stringContaining("on its way already") as string });
    await confirmHandOver(receiver, id, { received: true });
    expect(await refusal(confirmHandOver(receiver, id, { received: true }))).toMatchObject({ status: 409 });
  });

  it("stays with the giver when it did not arrive", async () => {
    const [giver, receiver, other] = [await makeUser("technician"), await makeUser("technician"), await makeUser("technician")];
    const { driveId } = await makeChip(giver);
    const { id } = await handOver(giver, driveId, { person: receiver.name, place: "Safe 1", userId: receiver.id });
    expect(await refusal(confirmHandOver(other, id, { received: false, text: "It is not here." }))).toMatchObject({ status: 403 });
    await confirmHandOver(receiver, id, { received: false, text: "The bag was empty." });
    const item = (await itemsOfDrive(giver, driveId)).items[0];
    expect([item.at, item.open]).toEqual([null, null]);
    expect(await logged(driveId, "item.not-received")).toMatchObject([{ reason: "The bag was empty." }]);
  });

  it("refuses a receiver who has no account that works, and an item of another drive", async () => {
    const giver = await makeUser("technician");
    const [{ driveId }, other] = [await makeChip(giver), await makeChip(giver)];
    expect(await refusal(handOver(giver, driveId, { person: "X", place: "Y", userId: (await makeUser("auditor")).id }))).toMatchObject({ status: 422 });
    expect(await refusal(handOver(giver, driveId, { person: "X", place: "Y" }, { item: { type: "drive", id: other.driveId } }))).toMatchObject({ status: 404 });
    expect(await refusal(handOver(giver, driveId, FROM))).toMatchObject({ status: 422 });
  });
});

describe("a hand-over to somebody outside", () => {
  it("wants the words in which they confirmed", async () => {
    const giver = await makeUser("technician");
    const { driveId } = await makeChip(giver);
    const { id } = await handOver(giver, driveId, { person: "Edda Finch", place: "Fennick" });
    expect(await refusal(confirmHandOver(giver, id, { received: true }))).toMatchObject({ status: 422, detail: expect.stringContaining("how they confirmed") as string });
    await confirmHandOver(giver, id, { received: true, text: "Signed the return slip." });
    expect(await logged(driveId, "item.received")).toMatchObject([{ confirmation: "Signed the return slip." }]);
  });
});

describe("where is what right now", () => {
  it("lists the latest hand-over of an item only, and finds it by place and by case", async () => {
    const giver = await makeUser("technician");
    const { driveId, caseId } = await makeChip(giver);
    const { ref } = (await Case.findByPk(caseId))!;
    const first = await handOver(giver, driveId, { person: "Edda Finch", place: `Room ${driveId}` });
    await confirmHandOver(giver, first.id, { received: true, text: "Signed the slip." });
    const second = await handOver(giver, driveId, { person: "Tomas Brandl", place: `Safe ${driveId}` });
    const found = async (q: string) => (await placedItems(giver, { q, page: 1, pageSize: 25 })).items.map((one) => one.handOver.id);
    expect(await found(`Safe ${driveId}`)).toEqual([second.id]);
    expect(await found(`Room ${driveId}`)).toEqual([]);
    expect(await found(ref)).toEqual([second.id]);
    await confirmHandOver(giver, second.id, { received: false, text: "He was not there." });
    expect(await found(`Room ${driveId}`)).toEqual([first.id]);
  });

  it("keeps other cases from an auditor with a case list", async () => {
    const giver = await makeUser("technician");
    const { driveId, caseId } = await makeChip(giver);
    await handOver(giver, driveId, { person: "Edda Finch", place: `Room ${driveId}` });
    const auditor = await makeUser("auditor");
    const found = async (cases: string[]) => (await placedItems({ ...auditor, cases }, { q: `Room ${driveId}`, page: 1, pageSize: 25 })).total;
    expect([await found([caseId]), await found([])]).toEqual([1, 0]);
    expect(await refusal(itemsOfDrive({ ...auditor, cases: [] }, driveId))).toMatchObject({ status: 404 });
  });
});
