import { execFileSync } from "node:child_process";
import { createHash } from "node:crypto";
import { readFileSync, realpathSync } from "node:fs";
import path from "node:path";

export const IMAGE_PACKAGES = ["seabios", "ovmf", "ipxe-qemu"] as const;
export const LEAST_IMAGES = 15;

export interface RealImage {
  name: string;
  bytes: Uint8Array;
}

/** Every distinct firmware image of three Debian packages, in order of its path. Throws with what to install. */
export function realImages(): RealImage[] {
  let listed = "";
  try {
    listed = execFileSync("dpkg", ["-L", ...IMAGE_PACKAGES], { encoding: "utf8", stdio: ["ignore", "pipe", "ignore"] });
  } catch {
    throw new Error(`The real images are not installed. Run: apt-get install ${IMAGE_PACKAGES.join(" ")}`);
  }
  const seen = new Set<string>();
  const images: RealImage[] = [];
  for (const file of listed.split("\n").filter((line) => /\.(bin|rom|fd)$/.test(line)).sort()) {
    const bytes = new Uint8Array(readFileSync(realpathSync(file)));
    const digest = createHash("sha256").update(bytes).digest("hex");
    if (seen.has(digest)) continue;
    seen.add(digest);
    images.push({ name: path.basename(file), bytes });
  }
  if (images.length < LEAST_IMAGES) throw new Error(`Only ${images.length} real images found, ${LEAST_IMAGES} are needed. Run: apt-get install ${IMAGE_PACKAGES.join(" ")}`);
  return images;
}
