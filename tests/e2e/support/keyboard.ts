import { expect, type Locator, type Page } from "@playwright/test";

/** On any of our pages a control is nearer than this, once the main part is reached. */
const MOST_STOPS = 60;

/** What somebody without a pointer can see of where they are; runs in the page. */
function seen(): string | null {
  const at = document.activeElement;
  if (!at || at === document.body) return null;
  const has = (element: Element) => {
    const style = getComputedStyle(element);
    return style.outlineStyle !== "none" && parseFloat(style.outlineWidth) >= 2;
  };
  const drawn = at.querySelector(".hot");
  const name = `${at.tagName.toLowerCase()} “${(at.getAttribute("aria-label") ?? at.textContent ?? "").trim().slice(0, 60)}”`;
  if (!has(at) && !(drawn && parseFloat(getComputedStyle(drawn).strokeWidth) >= 2)) return `${name} has the focus and does not show it`;
  const box = at.getClientRects()[0];
  if (!box || box.bottom <= 0 || box.top >= innerHeight || box.right <= 0 || box.left >= innerWidth) return `${name} has the focus out of sight`;
  // what keeps its place while the page scrolls must not lie over it
  const y = Math.min(Math.max(box.top + box.height / 2, 1), innerHeight - 1);
  for (let over = document.elementFromPoint(box.left + box.width / 2, y); over && !over.contains(at) && !at.contains(over); over = over.parentElement) {
    if (["fixed", "sticky"].includes(getComputedStyle(over).position)) return `${name} has the focus below something else`;
  }
  return null;
}

/** Somebody at a page without a pointer: Tab, Enter, Space, arrow keys, and the keys that the page lists. */
export class Keyboard {
  private document = 0;
  private last = "";
  constructor(readonly page: Page) {}

  /** Whatever was just done, the focus is somewhere; only a page that was loaded anew begins without. */
  private async kept(): Promise<void> {
    const { lost, born } = await this.page.evaluate(() => ({ lost: document.activeElement === null || document.activeElement === document.body, born: performance.timeOrigin }));
    if (born === this.document) expect.soft(lost, `the focus is lost after ${this.last}`).toBe(false);
    this.document = born;
  }

  /** On, or back, by Tab to this control; every stop on the way can be seen. */
  async to(target: Locator): Promise<void> {
    await target.waitFor();
    await this.kept();
    const hasIt = () => target.evaluate((element) => element === document.activeElement);
    const back = await target.evaluate((element) => document.activeElement !== document.body && (element.compareDocumentPosition(document.activeElement!) & Node.DOCUMENT_POSITION_FOLLOWING) !== 0);
    for (let stops = 0; !(await hasIt()); stops += 1) {
      expect(stops, `no way by Tab to ${target}`).toBeLessThan(MOST_STOPS);
      await this.page.keyboard.press(back ? "Shift+Tab" : "Tab");
      expect.soft(await this.page.evaluate(seen), `on the way to ${target}`).toBeNull();
    }
  }

  async press(target: Locator, key = "Enter"): Promise<void> {
    await this.to(target);
    this.last = `${key} on ${target}`;
    await this.page.keyboard.press(key);
  }

  /** A key of one character that acts from anywhere, or Enter and Escape where the focus is. */
  async key(key: string): Promise<void> {
    this.last = key;
    await this.page.keyboard.press(key);
  }

  async type(field: Locator, text: string): Promise<void> {
    if ((await field.inputValue()) === text) return;
    await this.to(field);
    if ((await field.inputValue()) !== "") await this.page.keyboard.press("ControlOrMeta+a");
    await this.page.keyboard.type(text);
    await expect(field).toHaveValue(text);
  }

  /** In a list of choices: down from its first until this value is chosen. */
  async choose(list: Locator, value: string): Promise<void> {
    if ((await list.inputValue()) === value) return;
    await this.to(list);
    await this.page.keyboard.press("Home");
    const choices = await list.locator("option").count();
    for (let i = 0; i < choices && (await list.inputValue()) !== value; i += 1) await this.page.keyboard.press("ArrowDown");
    await expect(list).toHaveValue(value);
  }

  async tick(box: Locator): Promise<void> {
    await this.press(box, "Space");
    await expect(box).toBeChecked();
  }

  /** The page's first stop leads past the edge to its main part. */
  async skip(): Promise<void> {
    await this.page.keyboard.press("Tab");
    const link = this.page.getByRole("link", { name: "Go to the main part" });
    await expect(link).toBeFocused();
    expect.soft(await this.page.evaluate(seen)).toBeNull();
    await this.key("Enter");
    await expect(this.page.getByRole("main")).toBeFocused();
  }
}
