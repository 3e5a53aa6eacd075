import { spawn } from "node:child_process";
import { randomUUID } from "node:crypto";
import { afterAll, beforeAll, beforeEach, describe, expect, it } from "vitest";
import { deliverMails } from "@/lib/commands/deliver-mails";
import { queueMail } from "@/lib/commands/queue-mail";
import { mailSender } from "@/lib/mail/transport";
import { connection, inTransaction, Mail } from "@/models";
import { MailSink, type SinkFault, type SinkStep } from "../support/mail-sink";

let sink: MailSink;
beforeAll(async () => {
  sink = await MailSink.open();
  // what other tests have left queued would stand in front
  while ((await deliverMails(() => Promise.resolve())).sent > 0);
});
afterAll(() => sink.close());
beforeEach(() => {
  sink.fault = "none";
  sink.onStep = () => {};
});

const send = () => mailSender({ host: "127.0.0.1", port: sink.port, secure: false, user: null, password: null, from: "desk@bench.example", fake: true }, "https://bench.example", "Bench", { connect: 400, silence: 400, whole: 3000 });
const queue = () => inTransaction((tx) => queueMail(tx, { to: `${randomUUID()}@customer.example`, subject: "S", text: "T", maskedText: "T" }));
const row = async (id: string) => (await Mail.findByPk(id))!;
const dueAgain = (id: string) => connection().query("UPDATE mails SET next_attempt_at = UTC_TIMESTAMP(6), leased_until = UTC_TIMESTAMP(6) - INTERVAL 1 SECOND WHERE id = ?", { replacements: [id] });
const taken = (id: string) => sink.taken.filter((one) => one === id).length;

/** RELIABILITY B12: none lost; doubled only where the receiver had taken the mail and could not say so. */
describe("a receiving server that", () => {
  it.each<[SinkFault, copies: number]>([
    ["refuses", 1], ["hangs at greeting", 1], ["421 at greeting", 1], ["450 at recipient", 1], ["hangs after data", 1], ["cuts before its yes", 1],
    // it had taken it on before it broke off: nobody can know that
    ["cuts after its yes", 2],
  ])("%s gets the mail when it is well again", async (fault, copies) => {
    const { id } = await queue();
    sink.fault = fault;
    await deliverMails(send());
    expect(await row(id)).toMatchObject({ state: "queued", attempts: 1 });
    expect((await row(id)).lastError).not.toBeNull();
    sink.fault = "none";
    await dueAgain(id);
    await deliverMails(send());
    expect(await row(id)).toMatchObject({ state: "sent", attempts: 2, sealed: null });
    expect(taken(id)).toBe(copies);
  });

  it.each<SinkFault>(["550 at recipient", "552 after data"])("says %s is believed, and other mails go on", async (fault) => {
    const { id } = await queue();
    sink.fault = fault;
    await deliverMails(send());
    expect(await row(id)).toMatchObject({ state: "dead", attempts: 1, lastError: expect.stringMatching(/55[02]/) as string });
    sink.fault = "none";
    const other = await queue();
    await deliverMails(send());
    expect([taken(id), taken(other.id)]).toEqual([0, 1]);
  });

  it("breaks off after its yes leaves a mark that the mail may be there twice", async () => {
    const { id } = await queue();
    sink.fault = "cuts after its yes";
    await deliverMails(send());
    sink.fault = "none";
    await dueAgain(id);
    await deliverMails(send());
    expect(await row(id)).toMatchObject({ state: "sent", possibleDuplicate: true, lastError: expect.stringContaining("twice") as string });
  });
});

/** Starts a sender of its own and ends it hard as soon as the receiver sees the step. */
async function killedAt(step: SinkStep): Promise<void> {
  const child = spawn(process.execPath, ["--conditions=react-server", "--import", "tsx", "tests/support/deliver-once.ts", String(sink.port)], { stdio: "ignore" });
  sink.onStep = (reached) => void (reached === step && child.kill("SIGKILL"));
  await new Promise((done) => child.once("exit", done));
  sink.onStep = () => {};
}

describe("a sender that is killed", () => {
  it.each<[SinkStep, copies: number]>([["connected", 1], ["MAIL", 1], ["RCPT", 1], ["DATA", 1], ["said yes", 2]])("at %s loses nothing, and what may be doubled is marked", async (step, copies) => {
    const { id } = await queue();
    await killedAt(step);
    expect(await row(id)).toMatchObject({ state: "sending", attempts: 1 });
    await deliverMails(send());
    // its lease still runs
    expect((await row(id)).state).toBe("sending");
    await dueAgain(id);
    await deliverMails(send());
    expect(await row(id)).toMatchObject({ state: "sent", attempts: 2, possibleDuplicate: true });
    expect(taken(id)).toBe(copies);
  });
});
