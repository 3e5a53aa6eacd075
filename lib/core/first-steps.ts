/** What a workshop has before its first case. */
export interface HouseFacts {
  /** accounts that can be used now */
  leads: number;
  technicians: number;
  twoPersonRule: boolean;
  /** false while mails are kept on this machine */
  mailLeaves: boolean;
  /** settings that customers' pages and papers lack */
  missing: string[];
}

export type FirstStep = "nobody-approves" | "one-person" | "mail" | "settings";

/** What an admin still has to see to, in this order; empty when nothing is open. */
export function firstSteps({ leads, technicians, twoPersonRule, mailLeaves, missing }: HouseFacts): FirstStep[] {
  return [
    ...(leads === 0 ? ["nobody-approves" as const] : twoPersonRule && leads + technicians < 2 ? ["one-person" as const] : []),
    ...(mailLeaves ? [] : ["mail" as const]),
    ...(missing.length > 0 ? ["settings" as const] : []),
  ];
}
