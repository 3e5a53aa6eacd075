import path from "node:path";

/** The checkout's root. */
export const root = path.resolve(import.meta.dirname, "../..");

/** A reason to stop that a person can act on: shown as it is, without a stack. */
export class Refusal extends Error {}

let out = process.stdout;

/** Commands whose output is read by programs keep standard output for themselves. */
export function sayOnStandardError() {
  out = process.stderr;
}

export function say(text) {
  out.write(`${text}\n`);
}

/** Runs `work` and shows that it goes on, once it has taken more than two seconds. */
export async function progress(label, work) {
  const began = Date.now();
  const lively = out.isTTY === true;
  const seconds = () => Math.round((Date.now() - began) / 1000);
  let shown = 0;
  const timer = setInterval(() => {
    const now = seconds();
    if (now < 2) return;
    if (lively) out.write(`\r${label} … ${now} s `);
    else if (shown === 0 || now - shown >= 10) say(`${label} … ${now} s`);
    else return;
    shown = now;
  }, 500);
  try {
    return await work();
  } finally {
    clearInterval(timer);
    if (shown > 0) out.write(lively ? `\r${label} … ${seconds()} s\n` : `${label}: done after ${seconds()} s\n`);
  }
}

/** Ends the process with the sentence of a Refusal, or with the stack of anything unforeseen. */
export function giveUp(error, code = 1) {
  process.stderr.write(`${error instanceof Refusal ? error.message : error?.stack ?? error}\n`);
  process.exit(code);
}
