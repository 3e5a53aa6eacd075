/** Hints for what people mistype. They never refuse anything: no maker's numbering is known here. */

/** What to look at twice in a number that was copied from a label; null when nothing in it is easily mistaken. */
export function lookAlikeHint(text: string): string | null {
  const found: string[] = [];
  if (/[0O]/i.test(text)) found.push("0 is a zero with a stroke, O is the letter.");
  if (/[8B]/i.test(text)) found.push("Look twice at 8 and B.");
  if (/[1I]/i.test(text)) found.push("Look twice at 1 and I.");
  return found.length > 0 ? found.slice(0, 2).join(" ") : null;
}

/** A likely address for one that isn't one, such as "edda@harrow,example "; null when nothing comes to mind. */
export function likelyEmail(text: string): string | null {
  const cleaned = text.normalize("NFKC").replace(/\s+/g, "").replace(/^mailto:/i, "").replace(/,/g, ".").replace(/;/g, "").replace(/\.{2,}/g, ".").replace(/^[<("'.]+|[>)"'.]+$/g, "").replace(/\.?\((at)\)\.?|\[at\]/i, "@");
  if (cleaned === text || !/^[\w.+-]+@[a-z0-9-]+(\.[a-z0-9-]+)+$/i.test(cleaned)) return null;
  return cleaned;
}
