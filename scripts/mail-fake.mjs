import { createWriteStream, mkdirSync, renameSync } from "node:fs";
import path from "node:path";
import { pipeline } from "node:stream/promises";
import { SMTPServer } from "smtp-server";

// The local mail fake: an SMTP server on loopback that delivers to nobody and keeps each mail as a file.
// Two domains answer as troubled mail servers do, so that the outbox can be tried: later.example and never.example.
const folder = path.join(process.env.TWINREAD_DATA, "mail-fake");
mkdirSync(folder, { recursive: true, mode: 0o700 });

const REFUSED = {
  "later.example": [451, "4.3.0 try again later"],
  "never.example": [550, "5.1.1 no such mailbox"],
};

let count = 0;

async function store(stream) {
  const name = `${new Date().toISOString().replaceAll(":", "-")}-${process.pid}-${String((count += 1)).padStart(4, "0")}.eml`;
  const draft = path.join(folder, `.${name}.part`);
  await pipeline(stream, createWriteStream(draft, { mode: 0o600, flags: "wx" }));
  renameSync(draft, path.join(folder, name));
}

const server = new SMTPServer({
  authOptional: true,
  disabledCommands: ["STARTTLS"],
  logger: false,
  onAuth: (auth, _session, done) => done(null, { user: auth.username }),
  onRcptTo(address, _session, done) {
    const refusal = REFUSED[address.address.split("@").at(-1).toLowerCase()];
    if (!refusal) return done();
    done(Object.assign(new Error(refusal[1]), { responseCode: refusal[0] }));
  },
  onData: (stream, _session, done) => void store(stream).then(() => done(), done),
});

server.on("error", (error) => {
  console.error(error.message);
  if (error.code === "EADDRINUSE") process.exit(1);
});
server.listen(Number(process.env.MAIL_PORT), "127.0.0.1");
for (const signal of ["SIGTERM", "SIGINT"]) process.on(signal, () => server.close(() => process.exit(0)));
