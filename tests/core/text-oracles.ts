import { execFileSync } from "node:child_process";
import { existsSync, mkdtempSync, readFileSync, rmSync, writeFileSync } from "node:fs";
import { tmpdir } from "node:os";
import path from "node:path";

/** Debian's srecord and binutils read and write the same texts independently of Twinread. */
export const missingOracles = ["/usr/bin/srec_cat", "/usr/bin/objcopy"].filter((tool) => !existsSync(tool));

/** Runs a tool on one file in a folder of its own and returns what it wrote. */
export function runTool(tool: string, input: Uint8Array, args: (from: string, to: string) => string[]): Uint8Array {
  const folder = mkdtempSync(path.join(tmpdir(), "text-oracle-"));
  try {
    const [from, to] = [path.join(folder, "in"), path.join(folder, "out")];
    writeFileSync(from, input);
    execFileSync(tool, args(from, to), { stdio: ["ignore", "ignore", "pipe"] });
    return existsSync(to) ? new Uint8Array(readFileSync(to)) : new Uint8Array(0);
  } finally {
    rmSync(folder, { recursive: true });
  }
}

/** Firmware of Debian packages, where installed: real content with long fills, packed parts and odd sizes. */
export const REAL_IMAGES = [
  "/usr/share/seabios/bios-256k.bin", "/usr/share/seabios/bios.bin", "/usr/share/OVMF/OVMF_VARS.fd", "/usr/share/OVMF/OVMF_VARS_4M.fd", "/usr/share/OVMF/OVMF_CODE_4M.fd",
].filter((file) => existsSync(file));
