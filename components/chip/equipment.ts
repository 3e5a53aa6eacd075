import { REMEMBERED, type UploadFormValues } from "./upload-form";

const KEY = "twinread.equipment";

/** What this browser's bench used last. Empty where storage is switched off: remembering is a comfort only. */
export function equipmentKept(): Partial<UploadFormValues> {
  try {
    const kept: unknown = JSON.parse(localStorage.getItem(KEY) ?? "{}");
    if (typeof kept !== "object" || kept === null) return {};
    return Object.fromEntries(Object.entries(kept).filter(([name, value]) => (REMEMBERED as readonly string[]).includes(name) && typeof value === "string"));
  } catch {
    return {};
  }
}

export function keepEquipment(fields: UploadFormValues): void {
  try {
    localStorage.setItem(KEY, JSON.stringify(Object.fromEntries(REMEMBERED.map((name) => [name, fields[name]]))));
  } catch {
    // full or switched off: the next read asks again
  }
}
