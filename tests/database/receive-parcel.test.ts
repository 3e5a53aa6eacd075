import { describe, expect, it } from "vitest";
import { createCase } from "@/lib/commands/create-case";
import { receiveParcel } from "@/lib/commands/receive-parcel";
import { recordDrive } from "@/lib/commands/record-drive";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { receiptInput } from "@/lib/schemas/receipt";
import { caseByNumber, parcelView, receiptView, toReceive } from "@/lib/queries/receipts";
import { Case, CustodyEntry, Mail } from "@/models";
import { makeChip, makeUser } from "../support/factory";
import { logged, refusal } from "../support/bench-steps";
import { makeRequest, parcel } from "../support/parcels";

const mailsOf = (ref: string) => Mail.findAll({ where: { kind: "parcel-received", subject: `Your parcel for case ${ref} is here` } });
const inWorkshop = async (caseId: string) => {
  const entries = await CustodyEntry.findAll({ where: { chainId: WORKSHOP_CHAIN, action: "parcel.received" } });
  return entries.map((e) => JSON.parse(e.body.toString()) as { subject: { id: string }; facts: object }).filter((body) => body.subject.id === caseId);
};

describe("a parcel that was asked for", () => {
  it("is received once: its case goes on, the log says how it came, the customer hears of it", async () => {
    const technician = await makeUser("technician");
    const { caseId, ref } = await makeRequest();
    expect((await toReceive(technician)).find((row) => row.caseId === caseId)).toMatchObject({ caseRef: ref, partNumber: "PN 4471-0093-B" });
    expect(await refusal(recordDrive(technician, caseId, { partNumber: "PN 4471-0093-B" }))).toMatchObject({ status: 409, detail: expect.stringContaining("not been received yet") as string });
    const lines = [{ what: "Part number", asSent: "yes" as const }, { what: "Serial number", asSent: "no" as const, text: "9KQ3-70BB-D2" }, { what: "Enclosure", asSent: "none" as const }];
    const made = await receiveParcel(technician, caseId, parcel({ smallBoard: "no", lines, accessories: "One cable" }));
    expect((await Case.findByPk(caseId))?.receivedAt?.toISOString()).toBe(made.receivedAt);
    const differs = "Serial number is not so: 9KQ3-70BB-D2; Enclosure is not there";
    expect(await receiptView(technician, caseId)).toMatchObject({ differs, smallBoard: "no", sealAsSent: "yes", carrier: "Marsh Post", by: { name: technician.name } });
    expect(await inWorkshop(caseId)).toMatchObject([{ facts: { caseRef: ref, differs, sealNumber: "S-4411", condition: "Dry, padding whole, board in its bag" } }]);
    expect((await toReceive(technician)).some((row) => row.caseId === caseId)).toBe(false);
    const mails = await mailsOf(ref);
    expect(mails.map((m) => m.recipient)).toEqual(["edda.finch@harrowfinch.example"]);
    expect(mails[0].textMasked).not.toContain("Serial number");
    const drive = await recordDrive(technician, caseId, { partNumber: "PN 4471-0093-B" });
    expect(await logged(drive.id, "drive.recorded")).toMatchObject([{ caseReceivedAt: made.receivedAt }]);
  });

  it("takes the day on which it is due, once, as a correction in the log; without one none is made up", async () => {
    const technician = await makeUser("technician");
    const corrected = async (caseId: string) => (await CustodyEntry.findAll({ where: { chainId: WORKSHOP_CHAIN, action: "case.corrected" } })).map((e) => JSON.parse(e.body.toString()) as { subject: { id: string }; facts: object }).filter((body) => body.subject.id === caseId).map((body) => body.facts);
    const { caseId, ref } = await makeRequest({ neededBy: "2027-03-12" });
    expect(await parcelView(technician, caseId)).toMatchObject({ dueOn: null, neededBy: "2027-03-12" });
    expect((await toReceive(technician)).find((row) => row.caseId === caseId)).toMatchObject({ dueOn: null, neededBy: "2027-03-12" });
    await receiveParcel(technician, caseId, parcel({ dueOn: "2027-03-10" }));
    expect((await Case.findByPk(caseId))?.dueOn).toBe("2027-03-10");
    expect(await corrected(caseId)).toEqual([{ caseRef: ref, changes: [{ field: "dueOn", from: null, to: "2027-03-10" }], reason: "Agreed on when the parcel was received." }]);
    const other = await makeRequest({ neededBy: "2027-03-12" });
    await receiveParcel(technician, other.caseId, parcel());
    expect([(await Case.findByPk(other.caseId))?.dueOn, await corrected(other.caseId)]).toEqual([null, []]);
    expect(receiptInput.safeParse({ ...parcel(), dueOn: "2027-02-30" }).success).toBe(false);
  });

  it("is not received twice, also not by two at once, and tells the customer once", async () => {
    const [one, other] = [await makeUser("technician"), await makeUser("lead")];
    const { caseId, ref } = await makeRequest();
    const both = await Promise.allSettled([receiveParcel(one, caseId, parcel()), receiveParcel(other, caseId, parcel())]);
    expect(both.map((b) => b.status).sort()).toEqual(["fulfilled", "rejected"]);
    expect(await refusal(receiveParcel(one, caseId, parcel()))).toMatchObject({ status: 409, detail: expect.stringContaining("received already") as string });
    expect(await inWorkshop(caseId)).toHaveLength(1);
    expect(await mailsOf(ref)).toHaveLength(1);
  });

  it("is not received into a closed case, nor by an auditor or an admin", async () => {
    const technician = await makeUser("technician");
    const { caseId } = await makeRequest();
    for (const role of ["auditor", "admin"] as const) expect(await refusal(receiveParcel(await makeUser(role), caseId, parcel()))).toMatchObject({ status: 403 });
    await Case.update({ closedAt: new Date(), closedReason: "Withdrawn" }, { where: { id: caseId } });
    expect(await refusal(receiveParcel(technician, caseId, parcel()))).toMatchObject({ status: 409, detail: expect.stringContaining("closed") as string });
  });

  it("is nothing to an auditor with another case list", async () => {
    const { caseId, ref } = await makeRequest();
    const limited = { ...(await makeUser("auditor")), cases: ["00000000-0000-4000-8000-000000000001"] };
    expect(await refusal(receiptView(limited, caseId))).toMatchObject({ status: 404 });
    expect(await refusal(parcelView(limited, caseId))).toMatchObject({ status: 404 });
    expect(await caseByNumber(limited, ref)).toBeNull();
    expect(await toReceive(limited)).toEqual([]);
  });
});

describe("a case made at the desk", () => {
  it("is received at once, and takes its receipt into the log of each of its drives, without a mail", async () => {
    const technician = await makeUser("technician");
    const { caseId, driveId, ref } = await makeChip(technician);
    const second = await recordDrive(technician, caseId, { serial: "SN-2ND" });
    const before = (await Case.findByPk(caseId))!.receivedAt!.toISOString();
    const { receivedAt } = await receiveParcel(technician, caseId, parcel({ carrier: null, tracking: null, sealAsSent: "none", sealNumber: null }));
    expect(receivedAt).toBe(before);
    for (const drive of [driveId, second.id]) expect(await logged(drive, "parcel.received")).toMatchObject([{ caseRef: ref, carrier: null, differs: null }]);
    expect(await inWorkshop(caseId)).toEqual([]);
    expect(await mailsOf(ref)).toEqual([]);
    expect(await refusal(receiveParcel(technician, caseId, parcel()))).toMatchObject({ status: 409 });
  });

  it("is found by its number in both forms, and a number that fits nothing is not", async () => {
    const technician = await makeUser("technician");
    const { id, ref } = await createCase(technician, { customer: { name: "A", email: "a@desk.example" }, damage: "Wet" });
    const { refChecked } = await parcelView(technician, id);
    for (const number of [ref, refChecked, refChecked.toLowerCase(), ` ${ref} `]) expect(await caseByNumber(technician, number)).toEqual({ id, ref, state: "here" });
    expect(await caseByNumber(technician, "26-99999")).toBeNull();
    expect(await caseByNumber(technician, `${ref}.${refChecked.endsWith("A") ? "B" : "A"}`)).toBeNull();
  });
});
