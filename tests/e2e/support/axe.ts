import { AxeBuilder } from "@axe-core/playwright";
import { expect, type Page } from "@playwright/test";

const RULES = ["wcag2a", "wcag2aa", "wcag21a", "wcag21aa", "wcag22aa", "best-practice"];

/** Nothing that axe finds. By night the same page differs in its colours only: then they alone are asked about, which takes less than half. */
export async function expectAccessible(page: Page, where: string, { theme = "light", within }: { theme?: "light" | "dark"; within?: string } = {}): Promise<void> {
  // no page of ours has a frame: all of axe runs in the page itself, not half of it in a second one
  const axe = new AxeBuilder({ page }).setLegacyMode().options({ resultTypes: ["violations"] });
  if (within) axe.include(within);
  const { violations } = await (theme === "dark" ? axe.withRules(["color-contrast"]) : axe.withTags(RULES)).analyze();
  expect(violations.flatMap(({ id, nodes }) => nodes.map((node) => `${id}: ${node.html}`)), where).toEqual([]);
}
