import { z } from "zod";
import { line, maybe, prose } from "./text";

const yesNo = (what: string) => z.boolean({ error: `Say whether ${what}.` });

export const startUpInput = z.strictObject({
  spins: yesNo("it spins"),
  ready: yesNo("it gets ready"),
  reportedSerial: maybe(line(120, "the serial that the drive reports")).optional(),
  attempts: z.int("Give a whole number of attempts.").min(1, "At least one attempt.").max(100, "At most 100 attempts."),
  note: maybe(prose(2000, "a note")).optional(),
}).refine((test) => test.spins || !test.ready, { message: "A drive gets ready only when it spins. Correct one of the two.", path: ["ready"] });
export type StartUpInput = z.infer<typeof startUpInput>;
