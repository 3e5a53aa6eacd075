import { beforeAll, beforeEach, describe, expect, it, vi } from "vitest";
import { actorOf, signedInUser } from "@/lib/auth/actor";
import { authOptions } from "@/lib/auth/options";
import { changeUser } from "@/lib/commands/change-user";
import { createBenchToken } from "@/lib/commands/create-bench-token";
import { createUser } from "@/lib/commands/create-user";
import { describe as say } from "@/lib/core/custody-actions";
import { SYSTEM, WORKSHOP_CHAIN, type Actor } from "@/lib/core/words";
import { accountView, userList } from "@/lib/queries/users";
import { Session, User, UserCase } from "@/models";
import { lastEntry, makeChip, type MadeChip, makeUser } from "../support/factory";
import { actorNow, answerOf, makeLimited } from "../support/limited";

const cookie = vi.hoisted(() => ({ sid: null as string | null }));
vi.mock("next-auth", () => ({ getServerSession: async () => (cookie.sid ? { sid: cookie.sid } : null) }));

const PASSWORD = "correct horse battery staple";
let admin: Actor;
let chips: MadeChip[];
const refs = (...made: MadeChip[]) => made.map((one) => one.ref).sort().join(", ");
const said = async (action: "user.changed" | "user.created") => say(action, await lastEntry(WORKSHOP_CHAIN, action)).sentence;
const over = (userId: string) => User.update({ endsAt: new Date(Date.now() - 1000) }, { where: { id: userId } });

beforeAll(async () => {
  admin = await makeUser("admin");
  const technician = await makeUser("technician");
  chips = [await makeChip(technician), await makeChip(technician), await makeChip(technician)];
});
beforeEach(() => { cookie.sid = null; });

describe("an account with a case list", () => {
  it("is made with list and last day, and the log says so in words", async () => {
    const { user } = await createUser(admin, { email: `made.${Date.now()}@bench.example`, name: "Wanda Quill", role: "auditor", endsOn: "2027-01-31", cases: [chips[1].caseId, chips[0].caseId] });
    expect((await actorNow(user.id)).cases!.toSorted()).toEqual([chips[0].caseId, chips[1].caseId].toSorted());
    expect(await said("user.created")).toBe(`Made an account for Wanda Quill (auditor, only ${refs(chips[0], chips[1])}, until 2027-01-31)`);
    const shown = (await userList(admin)).find((one) => one.id === user.id)!;
    expect(shown).toMatchObject({ endsOn: "2027-01-31", ended: false, cases: [{ ref: chips[0].ref }, { ref: chips[1].ref }] });
    expect((await accountView(await actorNow(user.id))).user.cases).toHaveLength(2);
  });

  it("is changed case by case and day by day, each in words", async () => {
    const { id } = await makeLimited([chips[0].caseId, chips[1].caseId], "2027-01-31");
    await changeUser(admin, id, { cases: [chips[0].caseId] });
    expect(await said("user.changed")).toMatch(new RegExp(`: cases from ${refs(chips[0], chips[1])} to ${chips[0].ref}$`));
    expect((await actorNow(id)).cases).toEqual([chips[0].caseId]);
    await changeUser(admin, id, { endsOn: "2027-02-28" });
    expect(await said("user.changed")).toMatch(/: ends from 2027-01-31 to 2027-02-28$/);
    await changeUser(admin, id, { cases: null, endsOn: null });
    expect(await said("user.changed")).toMatch(new RegExp(`: cases from ${chips[0].ref} to every case, ends from 2027-02-28 to nothing$`));
    expect((await actorNow(id)).cases).toBeUndefined();
    await changeUser(admin, id, { endsOn: "2027-01-31" });
    expect(await said("user.changed")).toMatch(/: ends from nothing to 2027-01-31$/);
    expect(await answerOf(() => changeUser(admin, id, { endsOn: "2027-01-31", cases: null }))).toMatchObject({ code: "does-not-fit", detail: "Nothing would change: these are the values on record." });
  });

  it("loses both with another role, and the log says so; back as auditor they don't come back", async () => {
    const { id } = await makeLimited([chips[0].caseId], "2027-01-31");
    await changeUser(admin, id, { role: "lead" });
    expect(await said("user.changed")).toMatch(new RegExp(`: role from auditor to lead, cases from ${chips[0].ref} to every case, ends from 2027-01-31 to nothing$`));
    expect(await UserCase.count({ where: { userId: id } })).toBe(0);
    expect(await User.findByPk(id)).toMatchObject({ limited: false, endsAt: null });
    await changeUser(admin, id, { role: "auditor" });
    expect((await actorNow(id)).cases).toBeUndefined();
  });

  it("keeps list and day when only the name, the password or the switch changes", async () => {
    const { id } = await makeLimited([chips[0].caseId], "2027-01-31");
    for (const change of [{ name: "Another Name" }, { newPassword: true }, { disabled: true }, { disabled: false }]) await changeUser(admin, id, change);
    expect((await actorNow(id)).cases).toEqual([chips[0].caseId]);
    expect((await userList(admin)).find((one) => one.id === id)!.endsOn).toBe("2027-01-31");
  });

  it.each([
    ["a list on another role", { role: "lead", cases: "one" }, "cases", "Only an auditor's account can carry a case list. Make the role auditor, or take the list away."],
    ["an end date on another role", { role: "technician", endsOn: "2027-01-31" }, "endsOn", "Only an auditor's account can carry an end date. Make the role auditor, or leave the date empty."],
    ["a list without a last day", { role: "auditor", cases: "one" }, "endsOn", "An account with a case list needs a last day. Give one."],
    ["a last day that is over", { role: "auditor", endsOn: "2020-02-29" }, "endsOn", "This day is over already. Give a later one, or switch the account off to end it now."],
    ["a case that isn't there", { role: "auditor", endsOn: "2027-01-31", cases: "unknown" }, "cases", "One of these cases isn't on record. Choose from the list."],
  ] as const)("refuses %s, when made and when changed, and makes nothing", async (_, { role, ...rest }, path, message) => {
    const { cases, endsOn } = { cases: undefined, endsOn: undefined, ...rest } as { cases?: string; endsOn?: string };
    const limits = { ...(endsOn ? { endsOn } : {}), ...(cases ? { cases: [cases === "one" ? chips[0].caseId : "0badc0de-0000-4000-8000-00000badc0de"] } : {}) };
    const email = `refused.${Math.random()}@bench.example`;
    const refused = { code: "does-not-fit", detail: message, errors: [{ path, message }] };
    expect(await answerOf(() => createUser(admin, { email, name: "Nobody", role, ...limits }))).toMatchObject(refused);
    expect(await User.count({ where: { email } })).toBe(0);
    const there = await makeUser("auditor");
    expect(await answerOf(() => changeUser(admin, there.id, { role, ...limits }))).toMatchObject(refused);
    expect(await User.findByPk(there.id)).toMatchObject({ role: "auditor", limited: false });
  });
});

const authorize = async (email: string) => {
  const provider = authOptions.providers[0] as unknown as { options: { authorize(credentials: object, request: object): Promise<{ sid: string } | null> } };
  return provider.options.authorize({ email, password: PASSWORD }, { headers: {} });
};
const bearer = (token: string) => new Request("http://127.0.0.1/api/bench", { headers: { authorization: `Bearer ${token}` } });
const asPage = () => new Request("http://127.0.0.1/api/bench");

describe("the end of an account", () => {
  it("gives the limits to sessions and bench tokens alike, read afresh at each request", async () => {
    const { id } = await makeLimited([chips[0].caseId]);
    const user = (await User.findByPk(id))!;
    const { token } = await createBenchToken(SYSTEM, { name: "Reviewer", userId: id });
    cookie.sid = (await authorize(user.email))!.sid;
    for (const request of [bearer(token), asPage()]) expect((await actorOf(request)).cases).toEqual([chips[0].caseId]);
    await changeUser(admin, id, { cases: [chips[1].caseId] });
    for (const request of [bearer(token), asPage()]) expect((await actorOf(request)).cases).toEqual([chips[1].caseId]);
  });

  it("refuses the sign-in with a sentence, only to who knows the password", async () => {
    const { id } = await makeLimited([chips[0].caseId], "2027-01-31");
    const { email } = (await User.findByPk(id))!;
    expect(await authorize(email)).toMatchObject({ id });
    await over(id);
    await expect(authorize(email)).rejects.toThrow(/^ended \d{1,2} [A-Z][a-z]+ \d{4}$/);
    await User.update({ passwordHash: (await User.findByPk(admin.id))!.passwordHash.replace(/.$/, "x") }, { where: { id } });
    expect(await authorize(email)).toBeNull();
  });

  it("ends a running session and a bench token at once, and an admin's new day opens them to a new sign-in", async () => {
    const { id } = await makeLimited([chips[0].caseId]);
    const { email } = (await User.findByPk(id))!;
    const { token } = await createBenchToken(SYSTEM, { name: "Reviewer", userId: id });
    const { sid } = (await authorize(email))!;
    cookie.sid = sid;
    expect((await signedInUser())?.id).toBe(id);
    await over(id);
    expect(await answerOf(() => actorOf(bearer(token)))).toMatchObject({ code: "not-signed-in", detail: expect.stringMatching(/^The account of this bench token ended on \d{1,2} [A-Z][a-z]+ \d{4}\. Ask the admin\.$/) });
    expect(await answerOf(() => actorOf(asPage()))).toMatchObject({ code: "not-signed-in" });
    expect((await Session.findByPk(sid))!.endedAt).not.toBeNull();
    expect((await userList(admin)).find((one) => one.id === id)!.ended).toBe(true);
    await changeUser(admin, id, { endsOn: "2099-01-31" });
    expect((await actorOf(bearer(token))).cases).toEqual([chips[0].caseId]);
    expect(await signedInUser()).toBeNull();
    cookie.sid = (await authorize(email))!.sid;
    expect((await signedInUser())?.id).toBe(id);
  });

  it("lets an account that has ended be changed in other things", async () => {
    const { id } = await makeLimited([chips[0].caseId]);
    await over(id);
    await changeUser(admin, id, { name: "Late Reviewer" });
    expect((await User.findByPk(id))!.name).toBe("Late Reviewer");
  });
});
