import { existsSync, readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { dataFolder } from "./accounts";

/** Soft line breaks and =3D of RFC 2045, section 6.7; our mails' links are ASCII. */
const plain = (text: string) => text.replace(/=\r?\n/g, "").replace(/=([0-9A-F]{2})/g, (_all, hex: string) => String.fromCharCode(parseInt(hex, 16)));

/** All mails that the local mail fake took for this address, oldest first. */
export function mailsTo(address: string): string[] {
  const folder = path.join(dataFolder(), "mail-fake");
  const names = existsSync(folder) ? readdirSync(folder).filter((name) => name.endsWith(".eml")).sort() : [];
  return names.map((name) => readFileSync(path.join(folder, name), "latin1")).filter((mail) => mail.includes(`To: ${address}`)).map(plain);
}
