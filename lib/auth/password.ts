import { randomBytes } from "node:crypto";
import { hash, verify } from "@node-rs/argon2";

/** Argon2id with the parameters of the OWASP password storage sheet: 19 MiB, 2 passes, 1 lane. */
const PARAMETERS = { algorithm: 2 /* Argon2id */, memoryCost: 19_456, timeCost: 2, parallelism: 1 };
const AT_ONCE = 4;

let running = 0;
const waiting: (() => void)[] = [];

async function inTurn<T>(run: () => Promise<T>): Promise<T> {
  if (running >= AT_ONCE) await new Promise<void>((go) => waiting.push(go));
  running += 1;
  try {
    return await run();
  } finally {
    running -= 1;
    waiting.shift()?.();
  }
}

export function hashPassword(password: string): Promise<string> {
  return inTurn(() => hash(password, PARAMETERS));
}

let nobody: Promise<string> | undefined;

/** True when the password fits. For an unknown user (`null`) a hash is checked all the same, so that both take as long. */
export async function passwordFits(stored: string | null, password: string): Promise<boolean> {
  const against = stored ?? (await (nobody ??= hashPassword(randomBytes(18).toString("base64url"))));
  const fits = await inTurn(() => verify(against, password).catch(() => false));
  return stored !== null && fits;
}

/** 20 characters that are easy to read aloud: no l, o, 0, 1. About 98 bits. */
export function oneTimePassword(): string {
  const letters = "abcdefghijkmnpqrstuvwxyz23456789";
  const drawn = [...randomBytes(20)].map((byte) => letters[byte % letters.length]).join("");
  return drawn.match(/.{5}/g)!.join("-");
}
