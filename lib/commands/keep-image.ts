import { type Arrived, keep } from "@/storage";
import { reportImage, reportSound } from "./report-image";

/**
 * Makes an arrived file an image of the store. Where a damaged one lay under its name, that is written down first, then
 * the right bytes take its place: reading the chip again is the way out that the screen names.
 */
export async function keepImage(arrived: Arrived, where: string): Promise<void> {
  await keep(arrived, async () => void (await reportImage(arrived.sha256, "damaged", where, { pauseMs: 0 })));
  await reportSound(arrived.sha256, where);
}
