/** One change to one line of lib/core. */
export interface Mutant {
  name: string;
  file: string;
  from: string;
  to: string;
  /** where a change can't be noticed, why */
  why?: string;
}

/** Changes nothing: must not be noticed, or the report is worthless. */
export const CONTROL: Mutant = { name: "nothing at all", file: "judge-set.ts", from: "alone: groups", to: "alone: groups", why: "a control, changes nothing" };

export const RULES: Mutant[] = [
  { name: "F05 never blocks", file: "repeat-findings.ts", from: 'period.bytes * 4 <= size && !confirmed) ? "blocks"', to: 'period.bytes * 4 <= size && !confirmed) ? "reason"' },
  { ...CONTROL, name: "nothing at all, after a change that was noticed" },
  { name: "F05 blocks for a confirmed size too", file: "repeat-findings.ts", from: "&& !confirmed", to: "" },
  { name: "F05 takes another size than the chip's", file: "repeat-findings.ts", from: "size !== chip.sizeBytes || ", to: "" },
  { name: "F06 notes dense content too", file: "repeat-findings.ts", from: "if (!dense && blockPairs < 2)", to: "if (blockPairs < 2000)" },
  { name: "F06 blocks below all pairs", file: "repeat-findings.ts", from: "matches === informative && ", to: "" },
  { name: "F05 F06 read fill as informative", file: "facts-repeats.ts", from: "else if (x === 0xff || x === 0) continue;", to: "" },
  { name: "F20 before F05", file: "facts-repeats.ts", from: "if (short) return { short, period: null, lines: [] };", to: "", why: "the findings ask for the short period first; this only saves the search for others" },
  { name: "F08 for any tail", file: "single-findings.ts", from: "if (tailUniform)", to: "if (over > 0)" },
  { name: "F10 single without a ratio", file: "single-findings.ts", from: " || best < WORD_SCORE_RATIO * wordScores[0]", to: "" },
  { name: "F24 as a reason", file: "single-findings.ts", from: 'code: "text-file", severity: "blocks"', to: 'code: "text-file", severity: "reason"' },
  { name: "F25 without a look at the rest", file: "single-findings.ts", from: "if (!container.parses)", to: "if (false)" },
  { name: "F25 a gzip file by its first bytes alone", file: "facts-kind.ts", from: "parses: gunzips", to: "parses: true" },
  { name: "F29 of chips that are never alike", file: "family.ts", from: "!among || !alike(among)", to: "!among" },
  { name: "F29 of a read that is as alike as usual", file: "family.ts", from: "if (alike(next) || ", to: "if (" },
  { name: "F29 takes fill as informative", file: "family.ts", from: "if (a[i] === 0xff || a[i] === 0) fill += 1;", to: "if (i < 0) fill += 1;" },
  { name: "F29 beside an equal image", file: "findings.ts", from: "found.length === 0 && !ownFault", to: "!ownFault" },
  { name: "F29 beside a fault of its own", file: "findings.ts", from: " && !ownFault", to: "" },
  { name: "F33 by chi-square alone", file: "facts-noise.ts", from: "expectedEntropy(block.length) - NOISE_ENTROPY_SLACK) return false", to: "expectedEntropy(block.length) - 9) return false" },
  { name: "F34 forgets bits that are always 0", file: "single-findings.ts", from: "((whole.everOne >> bit) & 1) === 0", to: "false" },
  { name: "F34 forgets bits that are always 1", file: "single-findings.ts", from: "(whole.alwaysOne >> bit) & 1", to: "false" },
  { name: "F04 on a uniform image", file: "single-findings.ts", from: "...(isUniform(facts) ? [] : contentFindings(facts, chip))", to: "...contentFindings(facts, chip)" },
  { name: "F13 without 32 bits", file: "diagnose-order.ts", from: "[1, 2, 16], [3, 4, 32], [2, 4, 32]", to: "[1, 2, 16]" },
  { name: "F12 from one byte later", file: "diagnose-order.ts", from: "leastRotation(a) - leastRotation(b) + n", to: "leastRotation(a) - leastRotation(b) + n + 1" },
  { name: "F14 without reversed bits", file: "diagnose-cause.ts", from: "return isBitReversed(a.bytes, b.bytes) ?", to: "return a === b ?" },
  { name: "F14 without inversion", file: "diagnose-cause.ts", from: "if (isInverted(a.bytes, b.bytes))", to: "if (a === b)" },
  { name: "F15 before the shift", file: "diagnose-cause.ts", from: "(same ? orderCause(a, b, () => shifted().shift) : null)", to: '(same ? orderCause(a, b, () => shifted().shift) ?? ({ code: "rearranged", confidence: "likely", faulty: null, counts: {} } as Cause) : null)' },
  { name: "F06 in both reads", file: "diagnose-cause.ts", from: "filter(({ line }) => !covers(b, line))", to: "filter(() => true)" },
  { name: "F06 names the sound read", file: "diagnose-cause.ts", from: 'const side: Side = onlyA.length > 0 ? "a" : "b";', to: 'const side: Side = onlyA.length > 0 ? "b" : "a";' },
  { name: "F21 as a plain slip", file: "diagnose-shift.ts", from: "b[0] !== 0x03", to: "b[0] !== 0x02" },
  { name: "F10 F11 only forwards", file: "diagnose-shift.ts", from: "[n + 1, -(n + 1)]", to: "[n + 1]" },
  { name: "F10 takes windows that did not move", file: "diagnose-shift.ts", from: "if (standsAt(a, b, from, length, 0)) continue;", to: "", why: "what did not move stands at a shift only where it fits its own neighbourhood, and that is asked as well" },
  { name: "F10 takes patterns that fit everywhere", file: "diagnose-shift.ts", from: "standsAt(a, b, from, length, bits) && !standsAt(a, a, from, length, bits)", to: "standsAt(a, b, from, length, bits)" },
  { name: "F16 from single flipped bits in blank space", file: "diagnose-segments.ts", from: "if (length >= CONTACT_LEAST_BYTES && dense)", to: "if (length >= CONTACT_LEAST_BYTES)" },
  { name: "F16 names the wrong read", file: "diagnose-segments.ts", from: 'if (inA) return "a";', to: 'if (inA) return "b";' },
  { name: "F18 from one side only", file: "diagnose-segments.ts", from: "Math.min(score(f.zeroToOne, oneBitsA), score(f.oneToZero, oneBitsB))", to: "Math.max(score(f.zeroToOne, oneBitsA), score(f.oneToZero, oneBitsB))" },
  { name: "F19 over fill", file: "diagnose-segments.ts", from: "dense && !fillA && !fillB", to: "dense" },
  { name: "F22 at any place", file: "diagnose-segments.ts", from: "f.atEdges === f.segments && ", to: "" },
  { name: "F23 at both ends", file: "diagnose-segments.ts", from: 'f.first >= size - EDGE_BYTES ? "last" : null', to: 'f.last >= size - EDGE_BYTES ? "last" : null' },
  { name: "the code depends on who comes first", file: "diagnose-cause.ts", from: "if (a.bytes[first] <= b.bytes[first])", to: "if (a !== b)", why: "an order of its own only matters where thresholds are met from one side alone; the property test covers it" },
  { name: "the faulty read is not turned round", file: "diagnose-cause.ts", from: "faulty: cause.faulty && other(cause.faulty)", to: "faulty: cause.faulty" },
  { name: "F07 whatever the chip's size", file: "diagnose-length.ts", from: "if (faulty === shortSide) return", to: "if (faulty === null) return" },
  { name: "F09 not searched for", file: "diagnose-length.ts", from: "const at = containedAt(shorter, longer);", to: "const at = null as number | null;" },
  { name: "V2 unseen", file: "diagnose-read-back.ts", from: "explainsAll(readBack, old, () => -1)", to: "false" },
  { name: "V3 as OR", file: "diagnose-read-back.ts", from: "value === (approved[at] & old[at])", to: "value === (approved[at] | old[at])" },
  { name: "V5 keeps the first bytes", file: "read-back-writes.ts", from: "const last = inPage + Math.floor((end - 1 - inPage) / chip) * chip;", to: "const last = inPage;" },
  { name: "V6 at any address", file: "read-back-writes.ts", from: " && step * PROTECT_PARTS >= size", to: "" },
  { name: "V8 for any number", file: "diagnose-read-back.ts", from: "c.differingBytes <= WEAK_CELLS_MOST && ", to: "" },
  { name: "a set ignores its findings", file: "judge-set.ts", from: "return read.findings ?? (facts ? singleFindings(facts, chip) : []);", to: "return facts && read.number < 0 ? singleFindings(facts, chip) : [];" },
  { name: "a read alone is not named", file: "judge-set.ts", from: "group.reads.length === 1 && groups.length > 1", to: "group.reads.length === 0" },
  { name: "a seating of the agreeing reads counts as their own", file: "judge-set.ts", from: "&& !main.seatings.includes(seatings[0])", to: "" },
];

/** Thresholds whose change can't be noticed, and why. */
export const THRESHOLDS_WITHOUT_EFFECT: Record<string, string> = {
  "ONE_WAY_LEAST_FLIPS halved": "8 flips that all go one way are 2.8 standard deviations at most, as the lesser of both views counts: below ONE_WAY_Z",
};
