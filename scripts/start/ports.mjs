import { createServer } from "node:net";
import { Refusal } from "./say.mjs";

/** Throws a Refusal that names the variable when somebody else listens there, or when the address is not this machine's. */
export async function checkPort(host, port, variable, what) {
  const problem = await new Promise((done) => {
    const probe = createServer();
    probe.once("error", (error) => done(error.code));
    probe.listen({ host, port, exclusive: true }, () => probe.close(() => done(null)));
  });
  if (problem === null) return;
  if (problem === "EADDRINUSE") {
    throw new Refusal(`Port ${port} on ${host}, wanted for ${what}, is taken by another program. Set ${variable} to a free port, or stop that program.`);
  }
  if (problem === "EACCES") throw new Refusal(`Port ${port} is kept for the system. Set ${variable} to a port above 1023.`);
  throw new Refusal(`Nothing can listen on ${host}, port ${port} (${problem}). Set ${variable === "PORT" ? "HOST" : variable} to an address of this machine.`);
}
