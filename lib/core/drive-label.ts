/** What a customer knows a drive by: "Model M2, PN 4471, serial S1"; what is not known is left out. */
export function driveLabel(drive: { partNumber?: string | null; model?: string | null; serial?: string | null }): string {
  return [drive.model, drive.partNumber, drive.serial && `serial ${drive.serial}`].filter(Boolean).join(", ");
}
