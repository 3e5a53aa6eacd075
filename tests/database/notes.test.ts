import { describe, expect, it } from "vitest";
import { addNote } from "@/lib/commands/add-note";
import { closeCase } from "@/lib/commands/close-case";
import { correctCase } from "@/lib/commands/correct-case";
import { createCase } from "@/lib/commands/create-case";
import { holdCase, resumeCase } from "@/lib/commands/hold-case";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { benchRows } from "@/lib/queries/bench";
import { caseView } from "@/lib/queries/cases";
import { notesOf } from "@/lib/queries/notes";
import { caseCorrection, noteInput } from "@/lib/schemas/note";
import { logged, refusal } from "../support/bench-steps";
import { makeChip, makeUser } from "../support/factory";

const HOUR = 3_600_000;
const ago = (hours: number) => new Date(Date.now() - hours * HOUR).toISOString();

describe("a case on hold", () => {
  it("says on the bench whom it waits for and since when, until it goes on", async () => {
    const technician = await makeUser("technician");
    const { caseId, driveId } = await makeChip(technician);
    const { since } = await holdCase(technician, caseId, { waitingFor: "donor", reason: "No board of this number on the shelf." });
    const hold = { waitingFor: "donor", since, reason: "No board of this number on the shelf." };
    expect((await caseView(technician, caseId)).hold).toEqual(hold);
    expect((await benchRows(technician)).find((row) => row.caseId === caseId)?.hold).toEqual(hold);
    await resumeCase(technician, caseId, { reason: "It came today." });
    expect((await caseView(technician, caseId)).hold).toBeNull();
    expect(await logged(driveId, "case.held")).toMatchObject([{ waitingFor: "donor", reason: hold.reason }]);
    expect(await logged(driveId, "case.resumed")).toMatchObject([{ waitingFor: "donor", reason: "It came today." }]);
  });

  it("keeps since when it waits while only the reason changes, and starts afresh for somebody else", async () => {
    const technician = await makeUser("technician");
    const { caseId } = await makeChip(technician);
    const first = await holdCase(technician, caseId, { waitingFor: "customer", reason: "Which serial?" });
    expect(await holdCase(technician, caseId, { waitingFor: "customer", reason: "Which serial and which password?" })).toEqual(first);
    expect((await holdCase(technician, caseId, { waitingFor: "parts", reason: "A clip is broken." })).since >= first.since).toBe(true);
    expect(await refusal(holdCase(technician, caseId, { waitingFor: "parts", reason: "A clip is broken." }))).toMatchObject({ status: 422 });
  });

  it("refuses to go on with what doesn't wait, and who only reads", async () => {
    const { caseId } = await makeChip(await makeUser("technician"));
    expect(await refusal(resumeCase(await makeUser("lead"), caseId, {}))).toMatchObject({ status: 409 });
    for (const role of ["auditor", "admin"] as const) expect(await refusal(holdCase(await makeUser(role), caseId, { waitingFor: "donor", reason: "None there." }))).toMatchObject({ status: 403 });
  });
});

describe("a note", () => {
  it("written long after what it tells of is marked late, in the list and in the log", async () => {
    const technician = await makeUser("technician");
    const { caseId, driveId } = await makeChip(technician);
    await addNote(technician, caseId, { text: "The bag was open.", happenedAt: ago(50) });
    await addNote(technician, caseId, { text: "Cleaned the pads.", happenedAt: ago(1) });
    await addNote(technician, caseId, { text: "Called the customer." });
    expect((await notesOf(technician, caseId)).items.map((note) => note.lateByHours)).toEqual([50, null, null]);
    expect((await logged(driveId, "note.added")).map((facts) => facts.lateByHours)).toEqual([50, undefined, undefined]);
  });

  it("is corrected by another one and stays as it was", async () => {
    const technician = await makeUser("technician");
    const { caseId } = await makeChip(technician);
    const { id } = await addNote(technician, caseId, { text: "U12 was warm." });
    await addNote(technician, caseId, { text: "It was U14 that was warm.", corrects: id });
    expect((await notesOf(technician, caseId)).items.map(({ text, corrects, correctedBy }) => ({ text, corrects, correctedBy }))).toEqual([
      { text: "U12 was warm.", corrects: null, correctedBy: 2 }, { text: "It was U14 that was warm.", corrects: 1, correctedBy: null },
    ]);
  });

  it("can be added to a closed case, and to one without a drive in the workshop's log", async () => {
    const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
    const { id, ref } = await createCase(technician, { customer: { name: "Lindmoor Veterinary Practice", email: "desk@lindmoor.example" }, damage: "Liquid" });
    await closeCase(lead, id, { kind: "cancelled", reason: "The customer called it off." });
    await addNote(technician, id, { text: "They called again." });
    expect((await logged(WORKSHOP_CHAIN, "note.added")).filter((facts) => facts.caseRef === ref)).toMatchObject([{ text: "They called again." }]);
    expect(await refusal(holdCase(technician, id, { waitingFor: "customer", reason: "Which one?" }))).toMatchObject({ status: 409 });
  });

  it("is refused for a time to come, another case's drive or note, and more than a note's length", async () => {
    const technician = await makeUser("technician");
    const [one, other] = [await makeChip(technician), await makeChip(technician)];
    const { id } = await addNote(technician, other.caseId, { text: "Elsewhere." });
    expect(await refusal(addNote(technician, one.caseId, { text: "Tomorrow.", happenedAt: ago(-24) }))).toMatchObject({ status: 422 });
    expect(await refusal(addNote(technician, one.caseId, { text: "Drive.", driveId: other.driveId }))).toMatchObject({ status: 404 });
    expect(await refusal(addNote(technician, one.caseId, { text: "Note.", corrects: id }))).toMatchObject({ status: 404 });
    expect(noteInput.safeParse({ text: "x".repeat(4001) }).success).toBe(false);
    expect(noteInput.safeParse({ text: "Fine", happenedAt: "yesterday" }).success).toBe(false);
  });
});

describe("a correction of the case", () => {
  it("keeps what was there before and why, and nothing of the customer in the log", async () => {
    const technician = await makeUser("technician");
    const { caseId, driveId } = await makeChip(technician);
    await correctCase(technician, caseId, { changes: { damage: "Liquid", customerName: "Corvane Ltd", customerEmail: "new@corvane.example" }, reason: "Misheard." });
    const view = await caseView(technician, caseId);
    expect([view.damage, view.customer.name, view.customer.email]).toEqual(["Liquid", "Corvane Ltd", "new@corvane.example"]);
    const [facts] = await logged(driveId, "case.corrected");
    expect(facts.changes).toEqual([
      { field: "damage", from: "Power surge", to: "Liquid" },
      { field: "customer's name", from: "(not in the log)", to: "(not in the log)" }, { field: "customer's email", from: "(not in the log)", to: "(not in the log)" },
    ]);
    expect(JSON.stringify(facts)).not.toMatch(/corvane|lindmoor/i);
    expect(await refusal(correctCase(technician, caseId, { changes: { damage: "Liquid" }, reason: "Again." }))).toMatchObject({ status: 422 });
    expect(caseCorrection.safeParse({ changes: { id: "x" }, reason: "Misheard." }).success).toBe(false);
  });
});
