import { describe, expect, it } from "vitest";
import { mailHtml } from "@/lib/mail/mail-html";
import { mailTemplates } from "@/lib/mail/templates";

const html = (text: string) => mailHtml(text, { subject: "S", workshop: "Alder Lane Drive Bench" });
const words = (page: string) => page.replace(/<title>.*?<\/title>/, "").replace(/<br>/g, " ").replace(/<[^>]+>/g, " ").replace(/&#39;/g, "'").replace(/&quot;/g, '"').replace(/&lt;/g, "<").replace(/&gt;/g, ">").replace(/&amp;/g, "&").split(/\s+/).filter(Boolean);

describe("a mail as HTML", () => {
  it("runs and loads nothing that somebody typed into it", () => {
    const page = html("Hello,\n\n<img src=x onerror=alert(1)> \"quoted\" & <script>alert(1)</script>\n\nhttps://a.example/?x=\"><script>alert(1)</script>\n");
    expect(page).not.toMatch(/<(img|script|link|iframe|form)\b/i);
    expect(page).not.toMatch(/<[^>]*\s(on\w+|src)=/i);
    expect(page).not.toContain("url(");
    expect(page).toContain("&lt;img src=x onerror=alert(1)&gt;");
  });
  it("turns an address on a line of its own into a way to open it, and still shows it in full", () => {
    const link = `https://bench.example/summary/${"A".repeat(43)}`;
    const page = html(`Open it:\n\n${link}\n\nBye.`);
    expect(page.split(`href="${link}"`)).toHaveLength(3);
    expect(page).toContain(`>${link}</a>`);
  });
  it("links nothing but web addresses", () => {
    expect(html("javascript:alert(1)\n\ndata:text/html,x\n\nfile:///etc/passwd")).not.toContain("<a ");
  });
  it("keeps digests and a seal's lines apart from each other", () => {
    const sha = "ab".repeat(32);
    expect(html(`Drive A: entry 5\n${sha}\nDrive B: entry 7\n${sha}\n`).split("<br>")).toHaveLength(4);
    expect(html(`twinread-seal/1\n41\n2026-03-12T00:00:04.120000Z\n12\n${sha}\n${sha}`)).toContain(`<pre`);
  });
  it("joins lines that were only wrapped", () => {
    expect(html("this is a line of a paragraph that was wrapped at seventy-two characters\nand goes on here.")).toContain("characters and goes on here.");
  });
  it.each(mailTemplates({ workshop: "Alder Lane Drive Bench", timeZone: "Europe/London" }).map((one) => [one.kind, one] as const))("of %s says every word of the plain text, in its order", (_kind, { subject, text }) => {
    const said = words(mailHtml(text, { subject, workshop: "" }));
    const plain = text.replace(/^- /gm, "").split(/\s+/).filter(Boolean);
    let at = 0;
    for (const word of said) if (word === plain[at]) at += 1;
    expect(plain.slice(at, at + 3)).toEqual([]);
  });
});
