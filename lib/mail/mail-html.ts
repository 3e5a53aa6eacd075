/**
 * A mail's text as HTML: made from the very text that goes beside it, so that both say the same. Inline styles only and
 * no picture, because mail programs load nothing; the text is hostile input as far as people typed into it.
 */
const INK = "#1A201C";
const FONT = "font-family:'Atkinson Hyperlegible Next','Atkinson Hyperlegible',Verdana,Arial,sans-serif";
const MONO = "font-family:'Atkinson Hyperlegible Mono',Consolas,Menlo,monospace";
/** a line that is shorter ends where its writer ended it; a longer one was only wrapped */
const WRAPPED_FROM = 56;

const escape = (text: string) => text.replace(/[&<>"']/g, (c) => ({ "&": "&amp;", "<": "&lt;", ">": "&gt;", '"': "&quot;", "'": "&#39;" })[c]!);
const isLink = (text: string) => /^https?:\/\/[^\s<>"']+$/.test(text);
/** digests, signatures and the lines of a seal: told digit by digit, never wrapped into a sentence */
const isExact = (line: string) => /^(?:[0-9a-f]{64}|[A-Za-z0-9+/]{60,}={0,2}|twinread-\S+)$/.test(line.trim());

function inline(line: string): string {
  return line.split(/(https?:\/\/[^\s<>"']+)/).map((part, i) => (i % 2 === 1 ? `<a href="${escape(part)}" style="color:#0E5A42">${escape(part)}</a>` : escape(part))).join("");
}

function block(lines: string[]): string {
  if (lines.length === 1 && isLink(lines[0])) {
    const href = escape(lines[0]);
    return `<p style="margin:0 0 6px"><a href="${href}" style="display:inline-block;background:#0E4A38;color:#F4F2E6;padding:9px 16px;text-decoration:none;font-weight:700">Open the page</a></p>`
      + `<p style="margin:0 0 16px;font-size:13px;word-break:break-all;${MONO}"><a href="${href}" style="color:#0E5A42">${href}</a></p>`;
  }
  if (lines.every((line) => line.startsWith("- "))) return `<ul style="margin:0 0 16px;padding-left:20px">${lines.map((line) => `<li>${inline(line.slice(2))}</li>`).join("")}</ul>`;
  if (lines[0] === "twinread-seal/1" || lines.every((line) => line.startsWith("  "))) {
    return `<pre style="margin:0 0 16px;padding:10px 12px;background:#E8E2D1;font-size:12px;white-space:pre-wrap;word-break:break-all;${MONO}">${lines.map((line) => escape(line.replace(/^ {2}/, ""))).join("\n")}</pre>`;
  }
  const said = lines.map((line, i) => {
    const end = i === lines.length - 1 ? "" : isExact(line) || isExact(lines[i + 1]) || line.length < WRAPPED_FROM ? "<br>" : " ";
    return `${isExact(line) ? `<span style="font-size:12px;word-break:break-all;${MONO}">${escape(line)}</span>` : inline(line)}${end}`;
  });
  return `<p style="margin:0 0 16px">${said.join("")}</p>`;
}

/** A whole HTML document of a mail's plain text. */
export function mailHtml(text: string, { subject, workshop }: { subject: string; workshop: string }): string {
  const blocks = text.replace(/\r\n?/g, "\n").split(/\n{2,}/).map((one) => one.split("\n").filter((line) => line.trim() !== "")).filter((lines) => lines.length > 0);
  const [body, seal] = blocks.at(-1)?.[0].startsWith("Newest seal of ") ? [blocks.slice(0, -1), blocks.at(-1)!] : [blocks, null];
  const foot = seal ? `<div style="border-top:1px solid #D0C8B3;padding-top:10px;font-size:12px;color:#5C635B">${block(seal).replace("margin:0 0 16px", "margin:0")}</div>` : "";
  return `<!doctype html><html lang="en"><head><meta charset="utf-8"><meta name="viewport" content="width=device-width"><title>${escape(subject)}</title></head>`
    + `<body style="margin:0;background:#F3EFE3;color:${INK};font-size:16px;line-height:24px;${FONT}">`
    + `<div style="background:#0E4A38;border-bottom:3px solid #B7A772;color:#F4F2E6;padding:12px 20px;font-weight:700">${escape(workshop)}</div>`
    + `<div style="max-width:600px;padding:22px 20px;background:#FBF9F2">${body.map(block).join("")}${foot}</div></body></html>`;
}
