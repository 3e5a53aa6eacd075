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

export const MAX_PHOTO_BYTES = 20 * MIB;
export const MAX_PHOTOS_A_CALL = 16;
/** width times height; more could fill the memory when it is opened */
export const MAX_PHOTO_PIXELS = 100_000_000;
export const MAX_PHOTO_NAME_CHARACTERS = 255;
export const MAX_CAPTION_CHARACTERS = 300;
/** what a customer may send with a request */
export const MAX_REQUEST_PHOTOS = 8;
export const MAX_REQUEST_BYTES = 64 * MIB;

export const SESSION_IDLE_SECONDS = 30 * 60;
export const SESSION_ABSOLUTE_SECONDS = 8 * 3600;
export const IDEMPOTENCY_DAYS = 7;
export const MIN_PASSWORD_CHARACTERS = 15;
/** rows of one CSV file; more has to be narrowed down */
export const MAX_CSV_ROWS = 20_000;

/** requests that come in within an hour */
export const REQUESTS_AN_HOUR_PER_ADDRESS = 20;
export const REQUESTS_AN_HOUR = 120;
/** calls that may be under way at once: from one address, and from all */
export const REQUESTS_AT_ONCE_PER_ADDRESS = 3;
export const REQUESTS_AT_ONCE = 12;
/** tries from one address within an hour, refused ones too */
export const REQUEST_TRIES_AN_HOUR = 80;
/** a person needs longer than this to fill the form in */
export const REQUEST_FILL_SECONDS = 3;
/** how old the form may be when it is sent */
export const REQUEST_FORM_HOURS = 48;
/** seals that one person may ask for */
export const SEALS_AN_HOUR_PER_PERSON = 20;
/** days within which a customer who asked for deletion hears from a lead */
export const DELETION_ANSWER_DAYS = 30;
