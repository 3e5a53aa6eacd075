import { spawn } from "node:child_process";
import path from "node:path";
import { Refusal, root } from "./say.mjs";

const active = new Map();
let over = false;

/**
 * Runs a command to its end. `show: "all"` lets its output through; `"trouble"` keeps it back and puts its last lines into
 * the Refusal that is thrown when it ends badly; `"code"` lets it through and resolves to the exit code, whatever it is.
 */
export function once(command, args, { env = process.env, show = "trouble", stdin = "ignore" } = {}) {
  if (over) return Promise.reject(new Refusal("Stopping: nothing new is started."));
  return new Promise((done, refuse) => {
    const quiet = show === "trouble";
    // a group of its own, so that its helpers end with it; one that talks to the terminal has to stay in the terminal's group
    const child = spawn(command, args, { cwd: root, env, detached: stdin === "ignore", stdio: [stdin, quiet ? "pipe" : "inherit", quiet ? "pipe" : "inherit"] });
    active.set(child, stdin === "ignore" ? -child.pid : child.pid);
    let output = "";
    for (const stream of [child.stdout, child.stderr]) stream?.on("data", (chunk) => (output = (output + chunk).slice(-20_000)));
    child.on("error", (error) => {
      active.delete(child);
      refuse(error);
    });
    child.on("close", (code, signal) => {
      active.delete(child);
      if (over) return refuse(new Refusal(`"${path.basename(command)}" was stopped.`));
      if (show === "code") return done(code ?? 1);
      if (code === 0) return done(0);
      const words = [command, ...args].join(" ");
      refuse(new Refusal(`${output}\n"${words}" ended with ${code ?? signal}. Its lines above say why.`));
    });
  });
}

/** Ends whatever `once` is running, and lets it start nothing more. */
export function endOnce() {
  over = true;
  for (const target of active.values()) {
    try {
      process.kill(target, "SIGTERM");
    } catch (error) {
      if (error.code !== "ESRCH") throw error;
    }
  }
}
