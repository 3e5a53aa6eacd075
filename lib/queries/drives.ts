import { driveFor, driveLetter } from "@/lib/commands/place";
import { allow } from "@/lib/commands/refuse";
import type { Actor } from "@/lib/core/words";
import type { DriveView } from "@/lib/views";
import { CustodyHead, Customer } from "@/models";
import { boardViews } from "./boards";
import { seenBy } from "./seen-by";

export async function driveView(actor: Actor, id: string): Promise<DriveView & { case: { id: string; ref: string; customerName: string } }> {
  allow(actor, "case.read");
  const { drive, case: found } = await driveFor(actor, id);
  const customer = await Customer.findByPk(found.customerId);
  const head = await CustodyHead.findByPk(id);
  return seenBy(actor, {
    id, letter: driveLetter(drive), partNumber: drive.partNumber ?? null, model: drive.model ?? null, serial: drive.serial ?? null, interface: drive.interface ?? null,
    boards: (await boardViews([id])).get(id) ?? [], custodyEntries: head?.seq ?? 0, case: { id: found.id, ref: found.ref, customerName: customer?.name ?? "" },
  });
}
