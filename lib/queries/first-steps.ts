import { Op } from "sequelize";
import { allow } from "@/lib/commands/refuse";
import { type FirstStep, firstSteps } from "@/lib/core/first-steps";
import type { Actor } from "@/lib/core/words";
import { env } from "@/lib/env";
import { User } from "@/models";
import { currentPolicy } from "./policy";

/** What a new workshop still lacks, for its admin; a demo lacks nothing. */
export async function openFirstSteps(actor: Actor): Promise<{ steps: FirstStep[]; missing: string[] }> {
  allow(actor, "user.manage");
  const { demo, smtp, workshop, workshopAddress, workshopContact } = env();
  if (demo) return { steps: [], missing: [] };
  const usable = { disabledAt: null, endsAt: { [Op.or]: [null, { [Op.gt]: new Date() }] } };
  const [leads, technicians] = [await User.count({ where: { role: "lead", ...usable } }), await User.count({ where: { role: "technician", ...usable } })];
  const { twoPersonRule } = await currentPolicy();
  const missing = [
    ...(workshop === "Twinread" ? ["WORKSHOP_NAME"] : []), ...(workshopAddress.length === 0 ? ["WORKSHOP_ADDRESS"] : []),
    ...(workshopContact.email || workshopContact.phone ? [] : ["WORKSHOP_CONTACT"]),
  ];
  return { steps: firstSteps({ leads, technicians, twoPersonRule, mailLeaves: !smtp.fake, missing }), missing };
}

/** Nobody can sign in yet: the sign-in page then says how the first account is made. */
export async function hasNoAccount(): Promise<boolean> {
  return (await User.count()) === 0;
}

/** Mails are kept on this machine and reach nobody, which in a demo is as it should be. */
export const mailStaysHere = (): boolean => env().smtp.fake && !env().demo;
