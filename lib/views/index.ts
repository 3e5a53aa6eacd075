/**
 * What leaves the house: plain, minimal objects for pages and API. Sizes in bytes, digests lower-case hex,
 * times RFC 3339 UTC text, ids UUIDs. Rows never leave; queries build these.
 */
export type * from "./approval";
export type * from "./board";
export type * from "./case";
export type * from "./chip";
export type * from "./closing";
export type * from "./custody";
export type * from "./drive";
export type * from "./image";
export type * from "./item";
export type * from "./list";
export type * from "./mail";
export type * from "./person";
export type * from "./photo";
export type * from "./print";
export type * from "./read";
export type * from "./request";
export type * from "./strip";
