/**
 * Every threshold of the read-check engine, each with the row of the fault catalogue it comes from. Measured on real
 * boot firmware; where a figure is our own choice beside a row the comment says why. Lengths in bytes, shares of 1.
 */

/** F04: one value holds at least this share */
export const NEARLY_BLANK_SHARE = 0.999;
/** F04: fewer other bytes than this ask for a reason */
export const NEARLY_BLANK_FEW = 64;

/** F05 F06: pairs that are not both the same fill value */
export const ALIAS_LEAST_PAIRS = 64;
/** F06: below this share of equal pairs a line is sound */
export const ALIAS_LEAST_SHARE = 0.98;
/** F06, own choice: in an image that is mostly fill, blocks stored twice on purpose look like a lost line; from this many pairs of blocks on it blocks */
export const ALIAS_BLOCK_PAIRS = 4;

/** F20 */
export const SHORT_PERIOD_MOST = 64;
export const SHORT_PERIOD_LEAST_SHARE = 0.98;
/** F20, own choice: pairs that say something must make up this part of the image, or a padded field in a blank chip would count */
export const SHORT_PERIOD_LEAST_PART = 1 / 16;

/** F09 */
export const HEADER_MOST = 4096;
export const HEADER_SEARCH = 64;

/** F10 on a single image: word score of the best shift against the unshifted one */
export const WORD_SCORE_RATIO = 5;
export const WORD_SCORE_LEAST = 512;
export const WORD_RUN_LEAST = 8;
export const WORD_DIFFERENT_LEAST = 4;

/** F10 F11 on a pair */
export const SHIFT_MOST_BITS = 128;
export const SHIFT_WINDOW = 64;
export const SHIFT_LEAST_SHARE = 0.2;
export const SHIFT_LEAST_WINDOWS = 2;
/** own choice: with fewer windows than this, windows of SHIFT_SMALL_WINDOW are used, for chips of some 100 bytes */
export const SHIFT_FEW_WINDOWS = 8;
export const SHIFT_SMALL_WINDOW = 16;
/** own choice: at most this many windows, spread evenly, so that the work does not grow with the image */
export const SHIFT_SAMPLED_WINDOWS = 4096;
/** own choice: a window of fewer different values fits nearly everywhere */
export const SHIFT_WINDOW_VALUES = 4;

/** F16 */
export const SEGMENT_GAP = 8;
export const CONTACT_LEAST_BYTES = 8;
export const CONTACT_FILL_SHARE = 0.95;
export const CONTACT_LEAST_SEGMENTS = 0.5;

/** F17 */
export const FLIPS_SINGLE_BIT_SHARE = 0.9;
/** F18 */
export const ONE_WAY_LEAST_FLIPS = 8;
export const ONE_WAY_Z = 3;

/** F19; the bits a byte also tell a burst of fill from single flipped bits in blank space (F16) */
export const FOREIGN_LEAST_BYTES = 32;
export const FOREIGN_BITS_A_BYTE = 1.25;
export const FOREIGN_LEAST_SHARE = 0.5;

/** F22 */
export const EDGE_BLOCK = 256;
export const EDGE_NEAR = 8;
export const EDGE_LEAST_SEGMENTS = 4;
/** own choice: longer pieces are blocks, not an edge */
export const EDGE_MOST_BYTES = 64;

/** F23 */
export const EDGE_BYTES = 16;

/** F24 */
export const HEX_TEXT_SHARE = 0.9;

/** F33: 4 KiB blocks, expected entropy less this; the 99 % and 1 % points of chi-square with 255 degrees of freedom */
export const NOISE_BLOCK = 4096;
export const NOISE_ENTROPY_SLACK = 0.05;
export const NOISE_CHI_SQUARE_LOW = 205.42;
export const NOISE_CHI_SQUARE_HIGH = 310.46;
/** check values A.7: below this no chi-square is shown (5 expected in each of 256 classes) */
export const CHI_SQUARE_LEAST_BYTES = 1280;

/** F34 */
export const CONSTANT_BIT_LEAST_BYTES = 256;
export const CONSTANT_BIT_BLOCKS_BYTES = 4096;

/** V8, own choice for "few" */
export const WEAK_CELLS_MOST = 64;
/** V5: page sizes of tools and chips, powers of two */
export const PAGE_LEAST = 4;
export const PAGE_MOST = 4096;
/** V6: protected areas are multiples of this part of the chip */
export const PROTECT_PARTS = 64;
/** a sector that stayed erased */
export const SECTOR_SIZES = [4096, 32_768, 65_536] as const;

/** F29: images of one kind of firmware are normally equal in a share between these two */
export const FAMILY_LEAST_SHARE = 0.9;
export const FAMILY_MOST_SHARE = 0.999;
/** F29, own choice: fewer bytes that are not fill in both say nothing */
export const FAMILY_LEAST_BYTES = 64;
