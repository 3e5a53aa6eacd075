import { randomUUID } from "node:crypto";
import { beforeAll, describe, expect, it } from "vitest";
import { approveImage } from "@/lib/commands/approve-image";
import { askForApproval, sendBack } from "@/lib/commands/ask-for-approval";
import { assessLog } from "@/lib/commands/assess-log";
import { correctBoard } from "@/lib/commands/correct-board";
import { correctChip } from "@/lib/commands/correct-chip";
import { correctDrive } from "@/lib/commands/correct-drive";
import { handOutImage, openHandedOut } from "@/lib/commands/hand-out-image";
import { changeKey } from "@/lib/commands/change-key";
import { checkChain } from "@/lib/commands/check-chain";
import { makeBundle } from "@/lib/commands/make-bundle";
import { makeSeal } from "@/lib/commands/make-seal";
import { makeComposite } from "@/lib/commands/make-composite";
import { recordBoard } from "@/lib/commands/record-board";
import { recordChip } from "@/lib/commands/record-chip";
import { recordDrive } from "@/lib/commands/record-drive";
import { recordTransfer } from "@/lib/commands/record-transfer";
import { revokeApproval } from "@/lib/commands/revoke-approval";
import { sendSummary } from "@/lib/commands/send-summary";
import { countReadAgain, setReadAside } from "@/lib/commands/set-read-aside";
import { storeReads } from "@/lib/commands/store-reads";
import { withdrawShare } from "@/lib/commands/withdraw-share";
import { AUDIT_LISTS, WORKSHOP_LISTS } from "@/lib/core/audit";
import { type Actor, SYSTEM } from "@/lib/core/words";
import { auditPage } from "@/lib/queries/audit-files";
import { auditOverview } from "@/lib/queries/audit-overview";
import { benchRows } from "@/lib/queries/bench";
import { caseList, caseView } from "@/lib/queries/cases";
import { chipFlatView, chipStrips, chipView } from "@/lib/queries/chip-view";
import { comparedReads, comparison, differencesCsv } from "@/lib/queries/compare";
import { findInRead, readBytes } from "@/lib/queries/read-bytes";
import { custodyHeads } from "@/lib/queries/custody-heads";
import { custodyCheckOfDrive, custodyOfDrive, workshopLog } from "@/lib/queries/custody";
import { decisionView } from "@/lib/queries/decision";
import { driveView } from "@/lib/queries/drives";
import { findDigest, findText } from "@/lib/queries/find";
import { mailList } from "@/lib/queries/mails";
import { policyView } from "@/lib/queries/policy";
import { readBackView } from "@/lib/queries/read-back-view";
import { scrubState } from "@/lib/queries/scrub-state";
import { driveProof } from "@/lib/queries/seals";
import { sessionView } from "@/lib/queries/session";
import { userList } from "@/lib/queries/users";
import { votes } from "@/lib/queries/votes";
import { auditInput } from "@/lib/schemas/audit";
import { listInput } from "@/lib/schemas/case";
import { readFields } from "@/lib/schemas/read";
import { CustodyHead, Read } from "@/models";
import { crc32Hex } from "@/lib/core/digest";
import { makeUser, sha256 } from "../support/factory";
import { answerOf, type FullCase, makeFullCase, makeLimited } from "../support/limited";

let own: FullCase;
let other: FullCase;
let limited: Actor;
let whole: Actor;
let technician: Actor;

beforeAll(async () => {
  technician = await makeUser("technician");
  const lead = await makeUser("lead");
  own = await makeFullCase(technician, lead);
  other = await makeFullCase(technician, lead);
  limited = await makeLimited([own.chip.caseId]);
  whole = await makeUser("auditor");
  await makeSeal(SYSTEM, "daily");
}, 120_000);

/** The same places of a case that never was. */
const never = (): FullCase => {
  const id = randomUUID();
  return {
    chip: { caseId: id, ref: "", driveId: id, originalBoardId: id, donorBoardId: id, chipId: id, donorChipId: id }, image: Buffer.alloc(0), readId: id, approvalId: id, secondChipId: id, compositeId: id, shareId: id,
  };
};

const pair = { reads: [1, 2] as [number, number], stage: "before" as const };
const reason = { reason: "Looked at for the insurer." };

/** Everything that is asked for by an id, as an auditor may. */
const LOOKS: [string, (actor: Actor, at: FullCase) => Promise<unknown>][] = [
  ["case", (a, { chip }) => caseView(a, chip.caseId)],
  ["drive", (a, { chip }) => driveView(a, chip.driveId)],
  ["chip", (a, { chip }) => chipView(a, chip.chipId)],
  ["donor's chip", (a, { chip }) => chipView(a, chip.donorChipId)],
  ["chip for a script", (a, { chip }) => chipFlatView(a, chip.chipId)],
  ["strips", (a, { chip }) => chipStrips(a, chip.chipId, { offset: 0 })],
  ["decision sheet", (a, { chip }) => decisionView(a, chip.chipId)],
  ["comparison", (a, { chip }) => comparison(a, chip.chipId, pair)],
  ["comparison that isn't there", async (a, { chip }) => {
    // of a chip that may be seen the sentence names it; of another it doesn't
    if (chip.chipId !== own.chip.chipId) await comparison(a, chip.chipId, { ...pair, reads: [1, 77] });
  }],
  ["compare page", (a, { chip }) => comparedReads(a, chip.chipId, pair)],
  ["differences", (a, at) => differencesCsv(a, at.secondChipId, pair)],
  ["bytes", (a, { readId }) => readBytes(a, readId, { offset: 0, length: 16 })],
  ["find bytes", (a, { readId }) => findInRead(a, readId, { text: "A", from: 0, way: "next" })],
  ["bytes past the end", async (a, at) => {
    if (at.readId !== own.readId) await readBytes(a, at.readId, { offset: 1_000_000, length: 16 });
  }],
  ["votes", (a, { compositeId }) => votes(a, compositeId)],
  ["custody log", (a, { chip }) => custodyOfDrive(a, chip.driveId)],
  ["check of the log", (a, { chip }) => custodyCheckOfDrive(a, chip.driveId)],
  ["proof of a seal", (a, { chip }) => driveProof(a, chip.driveId)],
  ["check of the log as a whole", (a, { chip }) => checkChain(a, chip.driveId)],
  ["hand-out", (a, { readId }) => handOutImage(a, readId, reason)],
  ["hand-out without a reason", async (a, at) => {
    if (at.readId !== own.readId) await handOutImage(a, at.readId, {});
  }],
  ["download", async (a, { readId }) => (await openHandedOut(a, readId, reason)).stream.destroy()],
  ["bundle", async (a, { chip }) => (await makeBundle(a, chip.caseId)).stream.destroy()],
  ["assessment", (a, { chip }) => assessLog(a, chip.driveId, { text: "Every entry looked at." })],
];

/** What is not an auditor's: refused alike, whatever the id. */
const CHANGES: [string, (actor: Actor, at: FullCase) => Promise<unknown>][] = [
  ["set aside", (a, { readId }) => setReadAside(a, readId, reason)],
  ["count again", (a, { readId }) => countReadAgain(a, readId, reason)],
  ["approve", (a, at) => approveImage(a, at.chip.chipId, { sha256: sha256(at.image), donorChipId: at.chip.donorChipId, statement: "Looked at.", reasons: {}, lookedAt: [] })],
  ["ask for approval", (a, { chip }) => askForApproval(a, chip.chipId, {})],
  ["send back", (a, { chip }) => sendBack(a, chip.chipId, reason)],
  ["revoke", (a, { approvalId }) => revokeApproval(a, approvalId, reason)],
  ["transfer", (a, { approvalId, chip }) => recordTransfer(a, approvalId, { kind: "write", donorChipId: chip.donorChipId })],
  ["composite", (a, { secondChipId }) => makeComposite(a, secondChipId, { reads: [1, 2, 3], ...reason })],
  ["drive", (a, { chip }) => recordDrive(a, chip.caseId, { partNumber: "PN 1" })],
  ["correct drive", (a, { chip }) => correctDrive(a, chip.driveId, { changes: { serial: "S1" }, ...reason })],
  ["board", (a, { chip }) => recordBoard(a, chip.driveId, { role: "donor", boardNumber: "BX 1" })],
  ["correct board", (a, { chip }) => correctBoard(a, chip.originalBoardId, { changes: { revision: "rev D" }, ...reason })],
  ["chip", (a, { chip }) => recordChip(a, chip.originalBoardId, { designator: "U77", bus: "spi", sizeBytes: 8192, sizeSource: "marking", supplyMillivolts: 3300, needsTransfer: true })],
  ["correct chip", (a, { chip }) => correctChip(a, chip.chipId, { changes: { package: "SOIC-8" }, ...reason })],
  ["reads", (a, { chip }) => storeReads(a, chip.chipId, readFields.parse({ stage: "before", seating: 1, reader: "R2", supplyMillivolts: 3300 }), [])],
  ["summary", (a, { chip }) => sendSummary(a, chip.caseId)],
  ["withdraw a link", (a, { shareId }) => withdrawShare(a, shareId)],
];

describe("an auditor with a case list asks by id", () => {
  for (const [name, look] of LOOKS) {
    it(`${name}: of a case on the list it is there, of another it never was`, async () => {
      expect(await answerOf(() => look(limited, own))).toBe("went through");
      const refused = await answerOf(() => look(limited, other));
      expect(refused).toMatchObject({ code: "not-found", status: 404 });
      expect(refused).toEqual(await answerOf(() => look(limited, never())));
    });
  }

  for (const [name, change] of CHANGES) {
    it(`${name}: the refusal does not tell whether it exists`, async () => {
      const refused = await answerOf(() => change(limited, other));
      expect(["not-found", "forbidden"]).toContain((refused as { code: string }).code);
      expect(refused).toEqual(await answerOf(() => change(limited, never())));
    });
  }

  it("leaves no entry in the log of a drive outside the list", async () => {
    const before = (await CustodyHead.findByPk(other.chip.driveId))!.seq;
    for (const [, look] of [...LOOKS, ...CHANGES]) await answerOf(() => look(limited, other));
    expect((await CustodyHead.findByPk(other.chip.driveId))!.seq).toBe(before);
  });

  it("an auditor without a list sees both", async () => {
    for (const [name, look] of LOOKS.filter(([one]) => !/isn't there|past the end|without a reason/.test(one))) {
      expect(await answerOf(() => look(whole, other)), name).toBe("went through");
    }
  });

  it("shows the read-backs of nothing but the list's chips", async () => {
    expect(await readBackView(limited, await chipView(limited, own.chip.chipId))).toBeNull();
    expect(await answerOf(async () => readBackView(limited, await chipView(limited, other.chip.donorChipId)))).toMatchObject({ code: "not-found" });
  });
});

const all = (q = "") => listInput.parse({ q, pageSize: 200 });
const caseIds = (rows: { id: string }[]) => rows.map((row) => row.id);

describe("lists of an auditor with a case list", () => {
  it("hold the cases on the list, and count no others", async () => {
    expect(await caseList(limited, all())).toMatchObject({ total: 1, items: [{ id: own.chip.caseId }] });
    expect((await caseList(whole, all())).total).toBeGreaterThan(1);
    const heads = await custodyHeads(limited, { page: 1, pageSize: 200 });
    expect(heads.total).toBe(2);
    expect(new Set(heads.items.map((row) => row.caseId))).toEqual(new Set([own.chip.caseId]));
    const bench = await benchRows(limited);
    expect(new Set(bench.map((row) => row.caseId))).toEqual(new Set([own.chip.caseId]));
    expect((await sessionView(limited, "")).benchCount).toBe(bench.length);
    expect((await sessionView(whole, "")).benchCount).toBe((await benchRows(whole)).length);
  });

  it("are searched within the list only: number, customer, damage, serial, board number", async () => {
    const { serial } = (await driveView(whole, other.chip.driveId));
    for (const q of [other.chip.ref, serial!]) {
      expect((await caseList(whole, all(q))).total, q).toBe(1);
      expect(await caseList(limited, all(q)), q).toMatchObject({ total: 0, items: [] });
      expect(await findText(limited, q), q).toEqual({ cases: [], hits: [] });
    }
    for (const q of ["Lindmoor", "Power surge", "PN 4471", "BX 40-3179"]) {
      expect(caseIds((await findText(limited, q)).cases), q).toEqual([own.chip.caseId]);
    }
    expect(caseIds((await findText(limited, own.chip.ref)).cases)).toEqual([own.chip.caseId]);
  });

  it("tell no hit for an image of another case, by digest or CRC-32, and all of the list's own", async () => {
    const row = (await Read.findByPk(other.readId))!;
    for (const digest of [sha256(other.image), sha256(other.image).slice(0, 12), crc32Hex(row.crc32)]) {
      expect((await findDigest(whole, digest.toLowerCase())).hits.length).toBeGreaterThan(0);
      expect(await findDigest(limited, digest.toLowerCase())).toEqual({ hits: [] });
      expect((await findText(limited, digest)).hits).toEqual([]);
    }
    expect((await findDigest(limited, sha256(own.image))).hits.length).toBe(3);
  });

  it("of the audit pages hold no other case, and what belongs to no case isn't there", async () => {
    const tells = [other.chip.ref, other.chip.caseId, other.chip.driveId, other.chip.chipId, other.readId, sha256(other.image)];
    for (const list of AUDIT_LISTS) {
      const run = () => auditPage(limited, list, auditInput.parse({ pageSize: 200 }));
      if (WORKSHOP_LISTS.includes(list)) expect(await answerOf(run), list).toMatchObject({ code: "not-found" });
      else {
        const text = JSON.stringify(await run());
        expect(tells.filter((part) => text.includes(part)), list).toEqual([]);
      }
    }
    for (const view of [await auditOverview(limited), await scrubState(limited)]) expect(tells.filter((part) => JSON.stringify(view).includes(part))).toEqual([]);
    expect((await auditPage(limited, "drives", auditInput.parse({}))).total).toBe(2);
  });

  it("are empty where the list is", async () => {
    const nobody: Actor = { ...limited, cases: [] };
    expect((await caseList(nobody, all())).total).toBe(0);
    expect((await custodyHeads(nobody, { page: 1, pageSize: 25 })).total).toBe(0);
    expect(await benchRows(nobody)).toEqual([]);
    expect((await sessionView(nobody, "")).benchCount).toBe(0);
    expect((await findDigest(nobody, sha256(own.image))).hits).toEqual([]);
    expect(await findText(nobody, "Lindmoor")).toEqual({ cases: [], hits: [] });
    expect(await answerOf(() => caseView(nobody, own.chip.caseId))).toMatchObject({ code: "not-found" });
  });
});

describe("what belongs to the workshop as a whole", () => {
  it("is as if it had no address; the policy stays readable", async () => {
    for (const [name, run] of [["workshop log", () => workshopLog(limited)], ["users", () => userList(limited)], ["outbox", () => mailList(limited, all())], ["seal", () => makeSeal(limited, "asked")], ["key", () => changeKey(limited, { purpose: "seal", reason: "Tried." })]] as const) {
      expect(await answerOf(run), name).toEqual({ code: "not-found", status: 404, detail: "The interface has no such address. Check its spelling and the id in it.", errors: undefined });
    }
    expect((await policyView(limited)).reads).toBeGreaterThan(1);
    expect(await answerOf(() => workshopLog(whole))).toBe("went through");
  });
});

describe("an image that many cases hold", () => {
  it("find an image of the list however many newer ones of other cases hold the same bytes", async () => {
    const template = (await Read.findByPk(own.readId))!.get({ plain: true });
    await Read.bulkCreate(Array.from({ length: 120 }, (_, i) => ({
      ...template, id: randomUUID(), chipId: other.chip.chipId, number: 1000 + i, storedAt: new Date(Date.now() + 60_000),
    })));
    expect((await findDigest(limited, sha256(own.image))).hits.length).toBe(3);
  });
});
