/** The eight groups of an IPv6 address as numbers; null when the text is none. */
function groups(text: string): number[] | null {
  const [head, tail, more] = text.split("::");
  if (more !== undefined) return null;
  const parse = (part: string | undefined) => (part ? part.split(":") : []);
  const [front, back] = [parse(head), parse(tail)];
  const gap = tail === undefined ? 0 : 8 - front.length - back.length;
  if (gap < 0 || (tail === undefined && front.length !== 8)) return null;
  const all = [...front, ...Array<string>(gap).fill("0"), ...back];
  return all.every((group) => /^[0-9a-f]{1,4}$/i.test(group)) ? all.map((group) => parseInt(group, 16)) : null;
}

/**
 * What one sender is counted under: an IPv4 address as it is, an IPv6 address by its first 64 bits (one line gives
 * its owner that many addresses). Anything else is counted together under its own text.
 */
export function addressGroup(address: string): string {
  const text = address.trim().replace(/^\[|\]$/g, "").replace(/%.*$/, "");
  const mapped = /^::ffff:(\d{1,3}(?:\.\d{1,3}){3})$/i.exec(text)?.[1];
  if (mapped) return mapped;
  const parsed = groups(text);
  return parsed ? `${parsed.slice(0, 4).map((group) => group.toString(16)).join(":")}::/64` : text.slice(0, 64).toLowerCase();
}
