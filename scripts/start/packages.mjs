import { accessSync, constants, existsSync } from "node:fs";
import path from "node:path";
import { once } from "./once.mjs";
import { Refusal, say } from "./say.mjs";

// Debian keeps servers in sbin, which is not on an ordinary user's path.
const FOLDERS = [...(process.env.PATH ?? "").split(":"), "/usr/local/sbin", "/usr/sbin", "/sbin"].filter(Boolean);

/** Full path of a program, or null. */
export function findProgram(name) {
  for (const folder of FOLDERS) {
    const file = path.join(folder, name);
    try {
      accessSync(file, constants.X_OK);
      return file;
    } catch {
      continue;
    }
  }
  return null;
}

const program = (name) => () => findProgram(name) !== null;
const file = (name) => () => existsSync(name);

/** Debian packages and how to see that what we need of each is there. */
const THERE = {
  "mariadb-server-core": () => findProgram("mariadbd") !== null && findProgram("mariadb-install-db") !== null,
  "mariadb-client": program("mariadb"),
  chromium: () => existsSync(process.env.CHROMIUM ?? "/usr/bin/chromium"),
  seabios: file("/usr/share/seabios/bios-256k.bin"),
  ovmf: file("/usr/share/OVMF/OVMF_VARS.fd"),
  unzip: program("unzip"),
  openssl: program("openssl"),
  zip: program("zip"),
  binutils: program("strings"),
  srecord: program("srec_cat"),
  ent: program("ent"),
  "ipxe-qemu": file("/usr/lib/ipxe/qemu/pxe-e1000.rom"),
  diffutils: program("cmp"),
  "poppler-utils": program("pdftotext"),
  qpdf: program("qpdf"),
  "zbar-tools": program("zbarimg"),
  curl: program("curl"),
  python3: program("python3"),
};

export const DATABASE_PACKAGES = ["mariadb-server-core", "mariadb-client"];
export const TEST_PACKAGES = [...DATABASE_PACKAGES, "chromium", "seabios", "ovmf", "unzip", "openssl", "zip", "binutils", "srecord", "ent", "ipxe-qemu", "diffutils", "poppler-utils", "qpdf", "zbar-tools", "curl", "python3"];

export const missingPackages = (wanted) => wanted.filter((name) => !THERE[name]());

/** Installs what is missing, after saying what; throws a Refusal with the command to type when it may not. */
export async function ensurePackages(wanted) {
  const missing = missingPackages(wanted);
  if (missing.length === 0) return;
  const install = ["apt-get", "install", "-y", "--no-install-recommends", ...missing];
  const isRoot = process.getuid?.() === 0;
  const command = `sudo apt-get update && sudo ${install.join(" ")}`;
  const list = missing.join(", ");
  if (!findProgram("apt-get")) throw new Refusal(`Missing: ${list}. This machine has no apt-get: install these programs its own way, then start again.`);
  if (!isRoot && !(process.stdin.isTTY && findProgram("sudo"))) {
    throw new Refusal(`Missing Debian packages: ${list}. Install them with:\n\n  ${isRoot ? command.replaceAll("sudo ", "") : command}\n\nthen start again.`);
  }
  say(`Installing Debian packages: ${list}${isRoot ? "" : " (sudo will ask for your password)"}`);
  const before = isRoot ? [] : ["sudo"];
  await run([...before, "apt-get", "update"]);
  await run([...before, ...install]);
  const still = missingPackages(missing);
  if (still.length > 0) throw new Refusal(`apt-get ended, but ${still.join(", ")} is still missing. Look at its lines above, then start again.`);
}

function run([command, ...args]) {
  return once(command, args, { show: "all", stdin: "inherit", env: { ...process.env, DEBIAN_FRONTEND: "noninteractive" } });
}

/** Refuses a Node that is too old for the app. */
export function checkNode() {
  const [major, minor] = process.versions.node.split(".").map(Number);
  if (major > 20 || (major === 20 && minor >= 12)) return;
  throw new Refusal(`Node ${process.versions.node} is too old. Install Node 20.20 or newer, then start again.`);
}
