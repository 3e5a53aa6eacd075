import { keep, lastLines, launch } from "./child.mjs";
import { checkPort } from "./ports.mjs";
import { sleep } from "./process-id.mjs";
import { Refusal } from "./say.mjs";
import { createConnection } from "node:net";

/** The local mail fake: takes every mail on loopback and keeps it as a file of the data folder. */
export async function keepMailFake({ settings, onGiveUp, mostRestarts, control }) {
  const { dataDir, mailPort } = settings;
  await checkPort("127.0.0.1", mailPort, "MAIL_PORT", "the local mail fake");
  return keep({
    dataDir, name: "mail", label: "The local mail fake", onGiveUp, mostRestarts, control,
    start: async () => {
      const handle = launch({
        control, dataDir, name: "mail", port: mailPort, command: process.execPath, args: ["scripts/mail-fake.mjs"],
        env: { PATH: process.env.PATH, MAIL_PORT: String(mailPort), TWINREAD_DATA: dataDir },
      });
      while (!(await listens(mailPort))) {
        const how = handle.hasEnded();
        if (how) throw new Refusal(`${lastLines(dataDir, "mail")}\nThe local mail fake ended while starting (${how}). Its last lines are above.`);
        await sleep(50);
      }
      return handle;
    },
  });
}

function listens(port) {
  return new Promise((done) => {
    const socket = createConnection({ host: "127.0.0.1", port });
    socket.once("connect", () => {
      socket.destroy();
      done(true);
    });
    socket.once("error", () => done(false));
  });
}
