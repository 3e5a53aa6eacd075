import { describe, expect, it } from "vitest";
import { approveImage } from "@/lib/commands/approve-image";
import { changePolicy } from "@/lib/commands/change-policy";
import { setReadAside } from "@/lib/commands/set-read-aside";
import { WORKSHOP_CHAIN } from "@/lib/core/words";
import { chainEntries } from "@/lib/queries/custody";
import { currentPolicy } from "@/lib/queries/policy";
import { logged, refusal, underPolicy, view } from "../support/bench-steps";
import { approve, freshImage, makeChip, makeReady, makeUser, sha256, stateOf, store } from "../support/factory";

/** A lead who took every read of the original. */
async function alone() {
  const lead = await makeUser("lead");
  const chip = await makeChip(lead);
  const image = freshImage();
  await makeReady(lead, chip, image, freshImage());
  return { technician: lead, lead, chip, image };
}

describe("with the two-person rule on", () => {
  it("refuses the lead who took a read of the chip, and writes the refusal down", async () => {
    const bench = await alone();
    const said = await refusal(approve(bench.lead, bench.chip, bench.image));
    expect(said).toMatchObject({ status: 409, detail: "You took a read of this chip, and whoever took one, set aside or not, can’t approve its image. Ask another lead." });
    expect(await logged(bench.chip.driveId, "approval.refused")).toMatchObject([{ rule: said.detail, sha256: sha256(bench.image) }]);
    expect(await stateOf(bench.lead, bench.chip.chipId)).toBe("ready");
  });

  it("refuses the lead whose one read was set aside", async () => {
    const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
    const chip = await makeChip(technician);
    const image = freshImage();
    const { reads: [own] } = await store(lead, chip.chipId, "before", freshImage(), 1);
    await setReadAside(lead, own.id, { reason: "The clip slipped." });
    await makeReady(technician, chip, image, freshImage());
    expect((await refusal(approve(lead, chip, image))).detail).toContain("set aside or not");
    const second = await makeUser("lead");
    expect((await view({ technician, chip })).approvers.map((p) => p.id)).toEqual(expect.arrayContaining([second.id]));
    expect((await view({ technician, chip })).approvers.map((p) => p.id)).not.toContain(lead.id);
    await approve(second, chip, image);
    expect(await stateOf(technician, chip.chipId)).toBe("approved");
  });

  it("lets a lead approve who read nothing but the donor's own content", async () => {
    const [technician, lead] = [await makeUser("technician"), await makeUser("lead")];
    const chip = await makeChip(technician);
    const image = freshImage();
    for (const seating of [1, 1]) await store(lead, chip.donorChipId, "donor", Buffer.alloc(8192, 0xff), seating);
    for (const seating of [1, 1, 2]) await store(technician, chip.chipId, "before", image, seating);
    await approve(lead, chip, image);
    expect((await view({ technician, chip })).approval).toMatchObject({ twoPersonRule: true });
  });

  it("refuses a technician, an auditor and an admin, whoever took the reads", async () => {
    const bench = await alone();
    for (const role of ["technician", "auditor", "admin"] as const) {
      const said = await refusal(approve(await makeUser(role), bench.chip, bench.image));
      expect(said).toMatchObject({ status: 403, detail: "Only a lead can approve an image. Ask for approval on the chip's page." });
    }
  });
});

describe("with the two-person rule switched off", () => {
  it("lets one person read and approve, and entry and approval say so", async () => {
    const bench = await alone();
    await underPolicy({ twoPersonRule: false }, async () => {
      expect((await view(bench)).conditions.find((c) => c.key === "two-people")?.value).toBe("switched off by policy: one person may do both");
      await approve(bench.lead, bench.chip, bench.image);
    });
    const { approval, state } = await view(bench);
    expect(state.state).toBe("approved");
    expect(approval).toMatchObject({ twoPersonRule: false, approvedBy: { id: bench.lead.id } });
    expect(await logged(bench.chip.driveId, "approval.given")).toMatchObject([{ twoPersonRule: false, readsTakenBy: [{ id: bench.lead.id }] }]);
    const entry = (await chainEntries(bench.chip.driveId)).find((e) => e.action === "approval.given")!;
    expect(entry.sentence).toContain("(two-person rule switched off)");
  });

  it("keeps the approval when its approver takes one more equal read, also after the rule is on again", async () => {
    const bench = await alone();
    await underPolicy({ twoPersonRule: false }, () => approve(bench.lead, bench.chip, bench.image));
    await store(bench.lead, bench.chip.chipId, "before", bench.image, 3);
    expect(await stateOf(bench.lead, bench.chip.chipId)).toBe("approved");
    expect(await logged(bench.chip.driveId, "approval.revoked")).toEqual([]);
  });

  it("still lets no technician approve", async () => {
    const bench = await alone();
    const technician = await makeUser("technician");
    await underPolicy({ twoPersonRule: false }, async () => {
      const input = { sha256: sha256(bench.image), donorChipId: bench.chip.donorChipId, statement: "Three clean reads.", reasons: {}, lookedAt: [] };
      expect(await refusal(approveImage(technician, bench.chip.chipId, input))).toMatchObject({ status: 403 });
    });
  });
});

describe("the policy itself", () => {
  it("is changed by an admin alone; from and to stand in the workshop's log", async () => {
    const policy = { ...(await currentPolicy()), secondFactor: false as const };
    for (const role of ["technician", "lead", "auditor"] as const) {
      expect(await refusal(changePolicy(await makeUser(role), { ...policy, twoPersonRule: false }))).toMatchObject({ status: 403 });
    }
    const before = (await logged(WORKSHOP_CHAIN, "policy.changed")).length;
    await underPolicy({ twoPersonRule: false }, async () => {});
    const changes = (await logged(WORKSHOP_CHAIN, "policy.changed")).slice(before);
    expect(changes).toEqual([
      { changes: [{ field: "twoPersonRule", from: true, to: false }] },
      { changes: [{ field: "twoPersonRule", from: false, to: true }] },
    ]);
  });
});
