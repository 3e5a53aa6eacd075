import { useId } from "react";
import type { UseFormRegisterReturn } from "react-hook-form";
import { EncryptionNote } from "@/components/chip/encryption-note";
import { Input } from "@/components/ui/input";
import { Select } from "@/components/ui/select";
import { ENCRYPTION_WORDS } from "@/lib/core/encryption";
import { type Encryption, ENCRYPTIONS } from "@/lib/core/words";
import type { LastUsed, Proposed } from "./last-used";
import { listOf, Proposals } from "./proposals";

export type DriveField = "partNumber" | "model" | "serial" | "interface" | "capacity" | "made" | "firmware" | "encryption";

const NAMES: readonly Proposed[] = ["partNumber", "model", "interface", "capacity", "made", "firmware"];
const OPTIONS = [{ value: "", label: "Nobody has looked yet" }, ...ENCRYPTIONS.map((value) => ({ value, label: ENCRYPTION_WORDS[value] }))];
const isEncryption = (text: string): text is Encryption => (ENCRYPTIONS as readonly string[]).includes(text);

/** Label data of a drive; at least one of the first three. */
export function DriveFields({ register, errors, encryption, used = {} }: {
  register(name: DriveField): UseFormRegisterReturn;
  errors: Partial<Record<DriveField, { message?: string }>>;
  /** as chosen so far */
  encryption: string;
  /** what this person used last */
  used?: LastUsed;
}) {
  const id = useId();
  const text = (name: Exclude<DriveField, "encryption">) => ({
    error: errors[name]?.message, spellCheck: false, ...(name === "serial" ? { autoComplete: "off" } : { list: listOf(used, id, name) }), ...register(name),
  });
  return (
    <>
      <div className="grid grid-cols-2 gap-4 slim:grid-cols-1">
        <Input label="Part number" mono hint="On the label, or on the enclosure of an external drive" {...text("partNumber")} />
        <Input label="Serial number" mono hint="Each drive has its own" {...text("serial")} />
        <Input label="Model" mono {...text("model")} />
        <Input label="Interface" hint="Such as SATA or USB" {...text("interface")} />
        <Input label="Capacity" hint="As printed, such as 2 TB" {...text("capacity")} />
        <Input label="Made" hint="Date or date code, and site" {...text("made")} />
        <Input label="Firmware" mono hint="Revision on the label" {...text("firmware")} />
        <Select label="Encrypted?" options={OPTIONS} hint="A small board in the enclosure is a sign" error={errors.encryption?.message} {...register("encryption")} />
      </div>
      <Proposals used={used} id={id} names={NAMES} />
      <EncryptionNote encryption={isEncryption(encryption) ? encryption : null} />
    </>
  );
}
