import type { UseFormRegisterReturn } from "react-hook-form";
import { Input } from "@/components/ui/input";

export type DriveField = "partNumber" | "model" | "serial" | "interface";

/** Label data of a drive; at least one of the first three. */
export function DriveFields({ register, errors }: { register(name: DriveField): UseFormRegisterReturn; errors: Partial<Record<DriveField, { message?: string }>> }) {
  return (
    <div className="grid grid-cols-2 gap-4 slim:grid-cols-1">
      <Input label="Part number" mono hint="On the label, or on the enclosure of an external drive" error={errors.partNumber?.message} {...register("partNumber")} />
      <Input label="Serial number" mono error={errors.serial?.message} {...register("serial")} />
      <Input label="Model" mono error={errors.model?.message} {...register("model")} />
      <Input label="Interface" hint="Such as SATA or USB" error={errors.interface?.message} {...register("interface")} />
    </div>
  );
}
