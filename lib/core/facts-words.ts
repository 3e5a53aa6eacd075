import { WORD_DIFFERENT_LEAST, WORD_RUN_LEAST } from "./thresholds";

/** Characters of words, names and paths: letters, digits, space and . _ / % : - */
const WORD = new Uint8Array(256);
for (const character of "ABCDEFGHIJKLMNOPQRSTUVWXYZabcdefghijklmnopqrstuvwxyz0123456789 ._/%:-") WORD[character.charCodeAt(0)] = 1;

/** For two neighbouring bytes: bit s is set when the 8 bits from bit s on are a word character. */
const PAIR = new Uint8Array(65_536);
for (let pair = 0; pair < 65_536; pair += 1) {
  for (let shift = 0; shift < 8; shift += 1) PAIR[pair] |= WORD[(pair >> (8 - shift)) & 0xff] << shift;
}

interface Run {
  end: number;
  score: number;
}

/** The run of word characters around `at`, in the image shifted left by `shift` bits. */
function runAround(bytes: Uint8Array, shift: number, at: number): Run {
  // with a shift the last byte has no neighbour to take bits from
  const next = shift === 0 ? 0 : 1;
  const valueAt = (i: number) => ((bytes[i] << shift) | (bytes[i + next] >> (8 - shift))) & 0xff;
  if (WORD[valueAt(at)] === 0) return { end: at, score: 0 };
  let from = at;
  while (from > 0 && WORD[valueAt(from - 1)] === 1) from -= 1;
  let different = 0;
  // the last three values that were new; a fourth makes enough
  let one = -1;
  let two = -1;
  let three = -1;
  let end = from;
  for (; end < bytes.length - next; end += 1) {
    const value = valueAt(end);
    if (WORD[value] === 0) break;
    if (different < WORD_DIFFERENT_LEAST && value !== one && value !== two && value !== three) {
      different += 1;
      three = two;
      two = one;
      one = value;
    }
  }
  const counts = end - from >= WORD_RUN_LEAST && different >= WORD_DIFFERENT_LEAST;
  return { end, score: counts ? end - from : 0 };
}

/**
 * W(0) to W(7). The word score of the image shifted left by s bits is the total length of runs of at least 8 word
 * characters that hold at least 4 different ones. Such a run covers one in any 8 addresses, and 4 bytes before or
 * behind it: a few looks into a table rule most of them out for all shifts at once.
 */
export function wordScores(bytes: Uint8Array): number[] {
  const scores = new Array<number>(8).fill(0);
  const done = new Array<number>(8).fill(0);
  const last = bytes.length - 6;
  for (let i = WORD_RUN_LEAST - 1; i < bytes.length; i += WORD_RUN_LEAST) {
    let open = 0xff;
    if (i < last) {
      open = PAIR[(bytes[i] << 8) | bytes[i + 1]];
      const behind = open === 0 ? 0 : PAIR[(bytes[i + 1] << 8) | bytes[i + 2]] & PAIR[(bytes[i + 2] << 8) | bytes[i + 3]]
        & PAIR[(bytes[i + 3] << 8) | bytes[i + 4]] & PAIR[(bytes[i + 4] << 8) | bytes[i + 5]];
      const before = open === 0 ? 0 : PAIR[(bytes[i - 1] << 8) | bytes[i]] & PAIR[(bytes[i - 2] << 8) | bytes[i - 1]]
        & PAIR[(bytes[i - 3] << 8) | bytes[i - 2]] & PAIR[(bytes[i - 4] << 8) | bytes[i - 3]];
      open &= behind | before;
    }
    for (let shift = 0; open !== 0; shift += 1, open >>= 1) {
      if ((open & 1) === 0 || i < done[shift]) continue;
      if (shift > 0 && i === bytes.length - 1) continue;
      const run = runAround(bytes, shift, i);
      done[shift] = run.end;
      scores[shift] += run.score;
    }
  }
  return scores;
}
