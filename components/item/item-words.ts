import type { HandOverView, ItemView } from "@/lib/views";

/** "Original board BX 40-3179 rev C": an item at the beginning of a line. */
export const itemTitle = (name: string) => name.charAt(0).toUpperCase() + name.slice(1);

export const whereText = (party: { person: string; place: string }) => `${party.person}, ${party.place}`;

/** Where an item is, as far as hand-overs say. */
export function itemWords(item: ItemView): string {
  if (item.at) return whereText(item.at.to);
  return item.open ? `With ${whereText(item.open.from)}` : "No hand-over recorded.";
}

/** Who has to do something about a hand-over that waits. */
export function waitsWords({ to, toUserId }: HandOverView): string {
  return toUserId ? `On its way to ${whereText(to)}. ${to.person} confirms.` : `On its way to ${whereText(to)}. Record how ${to.person} confirms.`;
}

/** `user` may confirm, or say that it did not arrive. */
export function handOverSteps(handOver: HandOverView, user: { id: string; role: string }): { confirms: boolean; denies: boolean } {
  const mine = handOver.toUserId === user.id;
  return { confirms: mine || handOver.toUserId === null, denies: mine || handOver.givenBy.id === user.id || user.role === "lead" };
}

/** The same for a list over all cases: one that waits is still with who gave it. */
export function itemWhere(handOver: HandOverView): string {
  return handOver.confirmed ? whereText(handOver.to) : `With ${whereText(handOver.from)}. ${waitsWords(handOver)}`;
}
