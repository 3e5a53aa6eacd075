import { execFileSync } from "node:child_process";
import { copyFileSync, existsSync, mkdtempSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";

export const SEABIOS = "/usr/share/seabios/bios-256k.bin";
/** almost all FF, as small parameter stores are */
export const OVMF_VARS = "/usr/share/OVMF/OVMF_VARS.fd";

export const newFolder = (): string => mkdtempSync(path.join(tmpdir(), "twinread-e2e-"));

/** The image under several names, as a reader would save one read after the other. */
export function copies(folder: string, image: string, names: string[]): string[] {
  if (!existsSync(image)) throw new Error(`${image} is missing. Install Debian's seabios and ovmf.`);
  return names.map((name) => {
    const file = path.join(folder, name);
    copyFileSync(image, file);
    return file;
  });
}

/** What `sha256sum` says. */
export const sha256sum = (file: string): string => execFileSync("sha256sum", [file], { encoding: "utf8" }).slice(0, 64);

/** CRC-32 from gzip's trailer: its last 8 bytes are CRC and length, both little-endian (RFC 1952). Upper case. */
export function gzipCrc(file: string): string {
  const packed = execFileSync("gzip", ["-c", file], { maxBuffer: 64 * 1024 * 1024 });
  return packed.readUInt32LE(packed.length - 8).toString(16).toUpperCase().padStart(8, "0");
}
