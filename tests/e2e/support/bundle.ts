import { execFileSync } from "node:child_process";
import { readdirSync } from "node:fs";
import path from "node:path";
import type { Locator, Page } from "@playwright/test";

/** The case's bundle, saved as its page saves it. */
export async function saveBundle(page: Page, folder: string, press = (button: Locator) => button.click()): Promise<string> {
  const saving = page.waitForEvent("download");
  await press(page.getByRole("button", { name: "Case bundle" }));
  const zip = path.join(folder, "bundle.zip");
  await (await saving).saveAs(zip);
  return zip;
}

/** Unpacks a bundle and checks it with common tools alone; throws at the first that says no. Answers the bag's folder. */
export function checkWithoutTwinread(zip: string, folder: string): string {
  execFileSync("unzip", ["-t", "-q", zip]);
  const out = path.join(folder, "bundle");
  execFileSync("unzip", ["-q", zip, "-d", out]);
  const names = readdirSync(out);
  if (names.length !== 1) throw new Error(`A bag is one folder; the bundle holds ${names.join(", ")}.`);
  const bag = path.join(out, names[0]);
  execFileSync("sha256sum", ["-c", "--strict", "--quiet", "manifest-sha256.txt"], { cwd: bag });
  execFileSync("sha256sum", ["-c", "--strict", "--quiet", "tagmanifest-sha256.txt"], { cwd: bag });
  execFileSync("sh", ["check.sh"], { cwd: bag });
  return bag;
}
