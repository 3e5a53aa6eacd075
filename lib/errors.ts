/** The closed set of refusals. The table is the only place where a refusal meets an HTTP status. */
export const STATUS = {
  malformed: 400,
  "not-signed-in": 401,
  forbidden: 403,
  "not-found": 404,
  "method-not-allowed": 405,
  "rule-against": 409,
  "too-large": 413,
  "wrong-media-type": 415,
  "does-not-fit": 422,
  "too-many": 429,
  internal: 500,
  unavailable: 503,
  "no-room": 507,
} as const;
export type ErrorCode = keyof typeof STATUS;

export const TITLE: Record<ErrorCode, string> = {
  malformed: "The request is malformed",
  "not-signed-in": "Not signed in",
  forbidden: "Your role may not do this",
  "not-found": "Not found",
  "method-not-allowed": "This address does not take that method",
  "rule-against": "A rule of the workflow stands against it",
  "too-large": "Too large",
  "wrong-media-type": "Wrong kind of content",
  "does-not-fit": "The input does not fit",
  "too-many": "Too many requests",
  internal: "Something went wrong here",
  unavailable: "Database or store is away",
  "no-room": "No room left",
};

export interface FieldError {
  path: string;
  message: string;
}

/** Thrown by commands and queries; `detail` is a sentence for the person, saying what to do. */
export class AppError extends Error {
  constructor(
    readonly code: ErrorCode,
    readonly detail: string,
    readonly extra: { errors?: FieldError[]; retryAfterSeconds?: number } = {},
  ) {
    super(detail);
    this.name = "AppError";
  }
  get status(): number {
    return STATUS[this.code];
  }
}
