import { z } from "zod";
import { readFields } from "@/lib/schemas/read";
import { MAX_IMAGE_BYTES } from "@/lib/limits";

/** The form beside the drop zone: the upload's own fields, and the supply is asked for. */
export const uploadForm = readFields.pick({
  stage: true, seating: true, reader: true, method: true, toolVersion: true, adapter: true, clockKilohertz: true, controllerHeld: true, note: true,
  format: true, base: true, size: true, fill: true,
}).extend({ supplyMillivolts: z.string().min(1, "Say which supply was set, or that it is unknown.") }).superRefine(({ format, base, size, fill }, context) => {
  if (format === "raw") return;
  const wants = { base: "Give the address of the image’s first byte, such as 0x0000.", size: "Give the image’s size in bytes, such as 524288.", fill: "Give the value of bytes left out, such as 0xFF." };
  for (const [name, value] of Object.entries({ base, size, fill })) {
    if (typeof value !== "number") context.addIssue({ code: "custom", path: [name], message: wants[name as keyof typeof wants] });
  }
  if (typeof size === "number" && (size < 1 || size > MAX_IMAGE_BYTES)) context.addIssue({ code: "custom", path: ["size"], message: "An image has 1 byte to 64 MiB (67108864)." });
});
