import { createCipheriv, createDecipheriv, randomBytes } from "node:crypto";
import { readSecret } from "@/lib/env";

const NONCE = 12;
const TAG = 16;

function key(): Buffer {
  const bytes = Buffer.from(readSecret("outbox-key"), "hex");
  if (bytes.length !== 32) throw new Error("The secret outbox-key is not 64 hex digits. Put the former one back from your backup.");
  return bytes;
}

/**
 * AES-256-GCM of a mail's text: nonce (12 bytes), tag (16 bytes), the rest. Bound to the mail's id, so that a sealed
 * text moved to another row does not open.
 */
export function sealText(id: string, text: string): Buffer {
  const nonce = randomBytes(NONCE);
  const cipher = createCipheriv("aes-256-gcm", key(), nonce, { authTagLength: TAG }).setAAD(Buffer.from(id));
  const body = Buffer.concat([cipher.update(text, "utf8"), cipher.final()]);
  return Buffer.concat([nonce, cipher.getAuthTag(), body]);
}

/** Throws when the key, the id or a byte is another. */
export function openText(id: string, sealed: Buffer): string {
  const cipher = createDecipheriv("aes-256-gcm", key(), sealed.subarray(0, NONCE), { authTagLength: TAG });
  cipher.setAAD(Buffer.from(id)).setAuthTag(sealed.subarray(NONCE, NONCE + TAG));
  return Buffer.concat([cipher.update(sealed.subarray(NONCE + TAG)), cipher.final()]).toString("utf8");
}
