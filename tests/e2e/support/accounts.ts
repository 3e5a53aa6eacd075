import { readFileSync } from "node:fs";
import path from "node:path";

/** The data folder of the app under test; scripts/test.mjs says where. */
export function dataFolder(): string {
  const folder = process.env.TWINREAD_DATA;
  if (!folder) throw new Error("TWINREAD_DATA is not set. Run the browser tests with: npm test");
  return folder;
}

export type Person = "mira" | "tomas" | "pell" | "ines" | "bram" | "rhys" | "odile";

export const emailOf = (person: Person): string => `${person}@alderlane.example`;

/** The demo's first password of an account, as kept in the data folder. */
export function passwordOf(person: Person): string {
  const lines = readFileSync(path.join(dataFolder(), "first-sign-in.txt"), "utf8").trimEnd().split("\n");
  const line = lines.find((one) => one.startsWith(`${emailOf(person)} `));
  if (!line) throw new Error(`first-sign-in.txt has no line for ${emailOf(person)}`);
  return line.slice(emailOf(person).length + 1);
}
