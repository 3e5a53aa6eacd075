import { spawn } from "node:child_process";
import { Refusal, root } from "./say.mjs";

const active = new Set();

/**
 * Runs a command to its end. `show: "all"` lets its output through; `"trouble"` keeps it back and puts its last lines into
 * the Refusal that is thrown when it ends badly; `"code"` lets it through and resolves to the exit code, whatever it is.
 */
export function once(command, args, { env = process.env, show = "trouble", stdin = "ignore" } = {}) {
  return new Promise((done, refuse) => {
    const quiet = show === "trouble";
    const child = spawn(command, args, { cwd: root, env, stdio: [stdin, quiet ? "pipe" : "inherit", quiet ? "pipe" : "inherit"] });
    active.add(child);
    let output = "";
    for (const stream of [child.stdout, child.stderr]) stream?.on("data", (chunk) => (output = (output + chunk).slice(-20_000)));
    child.on("error", (error) => {
      active.delete(child);
      refuse(error);
    });
    child.on("close", (code, signal) => {
      active.delete(child);
      if (show === "code") return done(code ?? 1);
      if (code === 0) return done(0);
      const words = [command, ...args].join(" ");
      refuse(new Refusal(`${output}\n"${words}" ended with ${code ?? signal}. Its lines above say why.`));
    });
  });
}

/** Ends whatever `once` is running. */
export function endOnce() {
  for (const child of active) child.kill("SIGTERM");
}
