/** Limits that pages, handlers and storage share. Bytes unless said otherwise. */
export const KIB = 1024;
export const MIB = 1024 * KIB;

export const MAX_IMAGE_BYTES = 64 * MIB;
export const MAX_CALL_BYTES = 512 * MIB;
export const MAX_FILES_A_CALL = 16;
export const MAX_FILE_NAME_CHARACTERS = 1024;
export const MAX_FIELDS_A_CALL = 80;
export const MAX_FIELD_BYTES = 16 * KIB;
export const MAX_JSON_BYTES = 1 * MIB;
export const MAX_BYTES_WINDOW = 64 * KIB;
export const MAX_RANGES = 10_000;
export const MAX_CUSTODY_BODY_BYTES = 1 * MIB;
/** free space below which no upload is taken (507) */
export const FREE_SPACE_FLOOR_BYTES = 256 * MIB;
export const UPLOADS_IN_FLIGHT = 16;

export const SESSION_IDLE_SECONDS = 30 * 60;
export const SESSION_ABSOLUTE_SECONDS = 8 * 3600;
export const IDEMPOTENCY_DAYS = 7;
export const MIN_PASSWORD_CHARACTERS = 15;
/** rows of one CSV file; more has to be narrowed down */
export const MAX_CSV_ROWS = 20_000;
