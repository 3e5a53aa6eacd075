import { ed25519 } from "@noble/curves/ed25519.js";
import { sha256 } from "@noble/hashes/sha2.js";
import type { KeyTools } from "../keyring";
import { toHex } from "../digest";

/** What the check needs of cryptography; Node's own may stand in for the digest. */
export interface VerifyTools {
  /** a digest that takes bytes as they come */
  createSha256(): { update(bytes: Uint8Array): unknown; digest(): Uint8Array };
  /** Ed25519 (RFC 8032) with a raw public key of 32 bytes */
  verifyEd25519(publicKey: Uint8Array, message: Uint8Array, signature: Uint8Array): boolean;
}

/** Plain JavaScript: needs neither a secure context nor the browser's own cryptography. Strict RFC 8032, no leniency. */
export const plainTools: VerifyTools = {
  createSha256: () => sha256.create(),
  verifyEd25519(publicKey, message, signature) {
    try {
      return signature.length === 64 && ed25519.verify(signature, message, publicKey, { zip215: false });
    } catch {
      // a point that is none, a key of another length
      return false;
    }
  },
};

/** The DER that stands before the 32 bytes of an Ed25519 public key (RFC 8410, section 4). */
const SPKI_PREFIX = [0x30, 0x2a, 0x30, 0x05, 0x06, 0x03, 0x2b, 0x65, 0x70, 0x03, 0x21, 0x00];
const PEM = /^-----BEGIN PUBLIC KEY-----\n([A-Za-z0-9+/]{59}=)\n-----END PUBLIC KEY-----\n?$/;

/** SPKI DER of an Ed25519 key in PEM; null for anything else. */
function spkiOf(pem: string): Uint8Array | null {
  const found = PEM.exec(pem);
  if (!found) return null;
  const der = Uint8Array.from(atob(found[1]), (character) => character.charCodeAt(0));
  return der.length === 44 && SPKI_PREFIX.every((byte, i) => der[i] === byte) ? der : null;
}

export function sha256Of(bytes: Uint8Array, tools: VerifyTools): Uint8Array {
  const hash = tools.createSha256();
  hash.update(bytes);
  return hash.digest();
}

export const sha256Hex = (bytes: Uint8Array, tools: VerifyTools) => toHex(sha256Of(bytes, tools));

/** The rules of the keyring with these tools. */
export function keyTools(tools: VerifyTools): KeyTools {
  return {
    keyId(pem) {
      const der = spkiOf(pem);
      return der && sha256Hex(der, tools);
    },
    verify(pem, bytes, signature) {
      const der = spkiOf(pem);
      return der !== null && tools.verifyEd25519(der.subarray(SPKI_PREFIX.length), bytes, signature);
    },
  };
}
