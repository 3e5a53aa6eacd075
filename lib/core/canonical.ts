import canonicalize from "canonicalize";

/** Thrown where a value can't be evidence; `path` says where, as in "$.facts.reads[2]". */
export class CanonicalError extends Error {
  constructor(readonly path: string, reason: string) {
    super(`${path}: ${reason}`);
    this.name = "CanonicalError";
  }
}

/** RFC 8785 text (JCS) of any JSON value, fractions allowed. Throws an Error on what JSON doesn't have. */
export function rfc8785(value: unknown): string {
  const text = canonicalize(value);
  if (text === undefined) throw new CanonicalError("$", "nothing that JSON can hold");
  return text;
}

function checkText(text: string, path: string): void {
  if (/\p{Surrogate}/u.test(text)) throw new CanonicalError(path, "a lone surrogate");
}

function checkNumber(n: number, path: string): void {
  if (!Number.isInteger(n)) throw new CanonicalError(path, "not a whole number: write it as decimal text");
  if (!Number.isSafeInteger(n)) throw new CanonicalError(path, "beyond 2^53-1: write it as text");
  if (Object.is(n, -0)) throw new CanonicalError(path, "minus zero");
}

function checkObject(value: object, path: string, above: object[]): void {
  if (above.includes(value)) throw new CanonicalError(path, "it contains itself");
  const inside = [...above, value];
  if (Array.isArray(value)) {
    for (let i = 0; i < value.length; i += 1) checkValue(value[i], `${path}[${i}]`, inside);
    return;
  }
  const prototype: unknown = Object.getPrototypeOf(value);
  if (prototype !== Object.prototype && prototype !== null) throw new CanonicalError(path, "not a plain object");
  if (Object.getOwnPropertySymbols(value).length > 0) throw new CanonicalError(path, "a symbol as key");
  for (const [key, item] of Object.entries(value)) {
    checkText(key, `${path}.${key}`);
    checkValue(item, `${path}.${key}`, inside);
  }
}

function checkValue(value: unknown, path: string, above: object[]): void {
  if (value === null || typeof value === "boolean") return;
  if (typeof value === "string") return checkText(value, path);
  if (typeof value === "number") return checkNumber(value, path);
  if (typeof value === "object") return checkObject(value, path, above);
  throw new CanonicalError(path, `${typeof value} has no place in evidence`);
}

/**
 * Canonical JSON for what is hashed and signed (CUSTODY.md, "Strictness"): RFC 8785, and besides no undefined, no
 * fractions, no whole number beyond 2^53-1, no lone surrogate, nothing but plain objects. Text isn't normalised.
 */
export function canonicalJson(value: unknown): string {
  checkValue(value, "$", []);
  return rfc8785(value);
}
