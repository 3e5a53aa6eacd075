import { readName, type Stage } from "./words";

/** The name under which an image leaves the house, ours and never the uploader's: `26-0042_A_U12_Read-1_0a1b2c3d.bin`. */
export function handOutName(image: { caseRef: string; drive: string; designator: string; stage: Stage; number: number; sha256: string }, ending: string): string {
  return `${image.caseRef}_${image.drive}_${image.designator}_${readName(image.stage, image.number).replace(" ", "-")}_${image.sha256.slice(-8)}.${ending}`;
}
