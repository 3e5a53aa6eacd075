/**
 * Who asks: nobody, each role, two who hold something that is worth nothing any more, and an auditor with a case list,
 * here of the case that is asked for. What that one gets of another case stands in authorization-limited.spec.ts.
 */
export const WHO = ["anonymous", "technician", "lead", "auditor", "admin", "disabled", "garbage", "limited"] as const;
export type Who = (typeof WHO)[number];
export type Cells = Record<Who, number>;

/** What the matrix may name in an address or a body. */
export interface Things {
  caseId: string;
  driveId: string;
  chipId: string;
  /** a counted read of the original that another technician took; nothing is approved */
  readId: string;
  policy: object;
  adminEmail: string;
  /** nobody has ever used it */
  unknown: string;
}

export interface ApiRow {
  method: "GET" | "POST" | "PUT" | "PATCH" | "DELETE";
  /** as the folders spell it */
  route: string;
  /** what fills the address; the route itself when left out */
  at?: (things: Things) => string;
  body?: (things: Things) => unknown;
  multipart?: true;
  cells: Cells;
}

/** The four roles in order; whoever is not signed in is 401. A limited auditor is an auditor unless said otherwise. */
const roles = (technician: number, lead: number, auditor: number, admin: number, limited = auditor): Cells => ({
  anonymous: 401, technician, lead, auditor, admin, disabled: 401, garbage: 401, limited,
});
const everyRole = (status: number): Cells => roles(status, status, status, status);
const anyone = (status: number): Cells => ({ ...everyRole(status), anonymous: status, disabled: status, garbage: status });
/** Changes are tried on what does not exist: who may gets 404, who may not gets 403 and does not learn that. */
const BENCH = roles(404, 404, 403, 403);
const LEAD = roles(403, 404, 403, 403);
/** What belongs to the workshop as a whole is for a limited auditor as if it had no address. */
const ADMIN = roles(403, 403, 403, 404, 404);

const reason = () => ({ reason: "Tried by the authorization matrix." });
const onUnknown = (route: string) => (things: Things) => route.replace("[id]", things.unknown);
const change = (method: ApiRow["method"], route: string, cells: Cells, body?: ApiRow["body"]): ApiRow => ({ method, route, at: onUnknown(route), body, cells });
const look = (route: string, at: ApiRow["at"], cells = everyRole(200)): ApiRow => ({ method: "GET", route, at, cells });
const chip = { designator: "U9", bus: "spi", sizeBytes: 4096, supplyMillivolts: 3300 };

const METHODS = ["GET", "POST", "PUT", "PATCH", "DELETE"] as const;

export const API: ApiRow[] = [
  ...METHODS.map((method) => ({ method, route: "/api/[...path]", at: () => "/api/drivers", cells: anyone(404) })),
  // next-auth answers for itself; without its own token it changes nothing and shows the sign-in page
  { method: "GET", route: "/api/auth/[...nextauth]", at: () => "/api/auth/csrf", cells: anyone(200) },
  { method: "POST", route: "/api/auth/[...nextauth]", at: () => "/api/auth/callback/credentials", cells: anyone(302) },
  { method: "GET", route: "/api/health", cells: anyone(200) },
  ...["/api/openapi.json", "/openapi.json"].map((route): ApiRow => ({ method: "GET", route, cells: anyone(200) })),
  // multipart is asked for first; the private link's secret is no account of anybody
  { method: "POST", route: "/api/requests", body: () => ({}), cells: anyone(415) },
  { method: "POST", route: "/api/requests/deletion", body: () => ({ token: "x".repeat(43) }), cells: anyone(404) },
  { method: "POST", route: "/api/requests/withdrawal", body: () => ({ token: "x".repeat(43) }), cells: anyone(404) },
  change("POST", "/api/requests/[id]/link", roles(403, 404, 403, 404)),
  change("DELETE", "/api/requests/[id]/link", roles(403, 404, 403, 404)),
  change("POST", "/api/requests/[id]/deletion-answer", roles(403, 404, 403, 404), () => ({ answer: "Tried by the authorization matrix." })),
  { method: "GET", route: "/summary/[token]/pdf", at: () => `/summary/${"x".repeat(43)}/pdf`, cells: anyone(404) },
  { method: "POST", route: "/api/shares/opened", body: () => ({ token: "x".repeat(43) }), cells: anyone(404) },

  { method: "POST", route: "/api/account/password", body: () => ({ current: "not the present one", next: "another long password of mine" }), cells: everyRole(422) },
  { method: "POST", route: "/api/account/sessions/end", cells: everyRole(200) },
  { method: "GET", route: "/api/account/tokens", cells: everyRole(200) },
  { method: "POST", route: "/api/account/tokens", body: () => ({ name: "" }), cells: everyRole(422) },
  change("DELETE", "/api/account/tokens/[id]", everyRole(404)),

  { method: "GET", route: "/api/bench", cells: everyRole(200) },
  { method: "GET", route: "/api/cases", cells: everyRole(200) },
  { method: "POST", route: "/api/cases", body: () => ({ customer: { name: "Authorization matrix", email: "matrix@apitests.example" }, damage: "None" }), cells: roles(201, 201, 403, 403) },
  look("/api/cases/[id]", (t) => `/api/cases/${t.caseId}`),
  change("POST", "/api/cases/[id]/drives", BENCH, () => ({ partNumber: "PN 1" })),
  look("/api/cases/[id]/drive-warnings", (t) => `/api/cases/${t.caseId}/drive-warnings?serial=S1`, roles(200, 200, 403, 403)),
  change("POST", "/api/cases/[id]/receipt", BENCH, () => ({ sealAsSent: "none", smallBoard: "none", parcelCondition: "Dry" })),
  change("POST", "/api/cases/[id]/bundle", roles(403, 404, 404, 403)),
  change("POST", "/api/cases/[id]/summary", LEAD),

  look("/api/drives/[id]", (t) => `/api/drives/${t.driveId}`),
  change("PATCH", "/api/drives/[id]", BENCH, () => ({ changes: { serial: "S1" }, ...reason() })),
  change("POST", "/api/drives/[id]/boards", BENCH, () => ({ role: "original", boardNumber: "BX 1" })),
  look("/api/drives/[id]/items", (t) => `/api/drives/${t.driveId}/items`),
  change("POST", "/api/drives/[id]/hand-over", BENCH, (t) => ({ item: { type: "drive", id: t.driveId }, from: { person: "A", place: "B" }, to: { person: "C", place: "D" }, condition: "Sound" })),
  change("POST", "/api/hand-overs/[id]/confirmation", BENCH, () => ({ received: false, text: "Tried by the authorization matrix." })),
  look("/api/drives/[id]/custody", (t) => `/api/drives/${t.driveId}/custody`),
  look("/api/drives/[id]/custody/check", (t) => `/api/drives/${t.driveId}/custody/check`),
  change("POST", "/api/audit/checks/[id]/assessment", roles(403, 403, 404, 403), () => ({ text: "Looked at every entry." })),
  change("PATCH", "/api/boards/[id]", BENCH, () => ({ changes: { revision: "rev B" }, ...reason() })),
  change("POST", "/api/boards/[id]/chips", BENCH, () => chip),

  look("/api/cases/[id]/photos", (t) => `/api/cases/${t.caseId}/photos`),
  look("/api/drives/[id]/photos", (t) => `/api/drives/${t.driveId}/photos`),
  look("/api/boards/[id]/photos", onUnknown("/api/boards/[id]/photos"), everyRole(404)),
  look("/api/chips/[id]/photos", (t) => `/api/chips/${t.chipId}/photos`),
  look("/api/shelf-boards/[id]/photos", onUnknown("/api/shelf-boards/[id]/photos"), everyRole(404)),
  ...["cases", "drives", "boards", "chips", "shelf-boards"].map((things): ApiRow => ({ ...change("POST", `/api/${things}/[id]/photos`, BENCH), multipart: true })),
  // the shelf belongs to the workshop as a whole
  { method: "GET", route: "/api/shelf-boards", cells: roles(200, 200, 200, 200, 404) },
  { method: "POST", route: "/api/shelf-boards", body: () => ({ boardNumber: "BX 1" }), cells: roles(201, 201, 403, 403, 404) },
  { method: "POST", route: "/api/shelf-boards/import", multipart: true, cells: roles(422, 422, 403, 403, 404) },
  look("/api/shelf-boards/[id]", onUnknown("/api/shelf-boards/[id]"), everyRole(404)),
  change("PATCH", "/api/shelf-boards/[id]", roles(404, 404, 403, 403, 404), () => ({ changes: { place: "Drawer 1" } })),
  change("POST", "/api/shelf-boards/[id]/taking", roles(404, 404, 403, 403, 404), (t) => ({ driveId: t.driveId })),
  look("/api/photos/[id]", onUnknown("/api/photos/[id]"), everyRole(404)),

  look("/api/chips/[id]", (t) => `/api/chips/${t.chipId}`),
  change("PATCH", "/api/chips/[id]", BENCH, () => ({ changes: { package: "SOIC-8" }, ...reason() })),
  look("/api/chips/[id]/view", (t) => `/api/chips/${t.chipId}/view`),
  look("/api/chips/[id]/strips", (t) => `/api/chips/${t.chipId}/strips`),
  look("/api/chips/[id]/comparison", (t) => `/api/chips/${t.chipId}/comparison?reads=1,2`),
  look("/api/chips/[id]/comparison/differences", (t) => `/api/chips/${t.chipId}/comparison/differences?reads=1,2`),
  { ...change("POST", "/api/chips/[id]/reads", BENCH), multipart: true },
  change("POST", "/api/drives/[id]/start-up-test", BENCH, () => ({ spins: true, ready: true, attempts: 1 })),
  change("PATCH", "/api/cases/[id]", BENCH, () => ({ changes: { damage: "Liquid" }, ...reason() })),
  change("POST", "/api/cases/[id]/hold", BENCH, () => ({ waitingFor: "donor", ...reason() })),
  change("POST", "/api/cases/[id]/resumption", BENCH, () => ({})),
  look("/api/cases/[id]/notes", (t) => `/api/cases/${t.caseId}/notes`),
  change("POST", "/api/cases/[id]/notes", BENCH, () => ({ text: "Tried by the authorization matrix." })),
  change("POST", "/api/cases/[id]/return", BENCH, () => ({ items: ["Drive A"], toPerson: "Nobody" })),
  change("POST", "/api/cases/[id]/closing", LEAD, () => ({ kind: "cancelled", ...reason() })),
  change("POST", "/api/cases/[id]/reopening", LEAD, reason),
  look("/api/cases/[id]/erasure", (t) => `/api/cases/${t.caseId}/erasure`),
  change("POST", "/api/cases/[id]/erasure", roles(403, 404, 403, 404), () => ({ caseRef: "26-0001", ...reason() })),
  change("POST", "/api/cases/[id]/keeping", roles(403, 404, 403, 404), () => ({ until: "2099-01-01", ...reason() })),
  change("POST", "/api/chips/[id]/approval-request", BENCH, () => ({})),
  change("POST", "/api/chips/[id]/approval", LEAD, (t) => ({ sha256: "0".repeat(64), donorChipId: t.unknown, statement: "Tried by the matrix." })),
  change("POST", "/api/chips/[id]/sending-back", LEAD, reason),
  change("POST", "/api/chips/[id]/composite", LEAD, () => ({ reads: [1, 2, 3], ...reason() })),
  change("POST", "/api/approvals/[id]/revocation", LEAD, reason),
  change("POST", "/api/approvals/[id]/transfer", BENCH, (t) => ({ kind: "write", donorChipId: t.unknown })),

  look("/api/reads/[id]/bytes", (t) => `/api/reads/${t.readId}/bytes?offset=0&length=16`),
  look("/api/reads/[id]/find", (t) => `/api/reads/${t.readId}/find?bytes=5A`),
  look("/api/reads/[id]/votes", (t) => `/api/reads/${t.readId}/votes`, everyRole(404)),
  // on a read that exists: whose it is decides
  { method: "POST", route: "/api/reads/[id]/download", at: (t) => `/api/reads/${t.readId}/download`, body: reason, cells: roles(403, 200, 200, 403) },
  { method: "POST", route: "/api/reads/[id]/count-again", at: (t) => `/api/reads/${t.readId}/count-again`, body: reason, cells: roles(403, 409, 403, 403) },
  { method: "POST", route: "/api/reads/[id]/set-aside", at: (t) => `/api/reads/${t.readId}/set-aside`, body: reason, cells: roles(403, 200, 403, 403) },
  { method: "GET", route: "/api/find", at: () => "/api/find?digest=00000000", cells: everyRole(200) },
  { method: "POST", route: "/api/find", multipart: true, cells: everyRole(200) },

  { method: "GET", route: "/api/audit/[list]", at: () => "/api/audit/sessions?format=csv", cells: roles(403, 200, 200, 200, 404) },
  change("POST", "/api/audit/checks/[id]", roles(403, 404, 404, 404)),
  { method: "GET", route: "/api/seals", cells: roles(403, 200, 200, 200) },
  { method: "POST", route: "/api/seals", cells: roles(403, 201, 201, 201, 404) },
  { method: "GET", route: "/api/seals/[number]", at: () => "/api/seals/1", cells: roles(403, 200, 200, 200) },
  // the newest seal may be older than this drive: asked of one that is not there
  look("/api/drives/[id]/proof", (t) => `/api/drives/${t.driveId}/proof?seal=4000000000`, everyRole(404)),
  { method: "GET", route: "/api/keys", cells: roles(403, 200, 200, 200) },
  { method: "POST", route: "/api/keys", body: () => ({ purpose: "seal", ...reason() }), cells: roles(403, 403, 403, 201, 404) },
  { method: "GET", route: "/api/mails", cells: roles(403, 403, 403, 200, 404) },
  change("POST", "/api/mails/[id]/retry", ADMIN),
  { method: "GET", route: "/api/policy", cells: everyRole(200) },
  { method: "PUT", route: "/api/policy", body: (t) => t.policy, cells: roles(403, 403, 403, 422) },
  change("DELETE", "/api/shares/[id]", LEAD),
  { method: "GET", route: "/api/users", cells: roles(403, 403, 403, 200, 404) },
  { method: "POST", route: "/api/users", body: (t) => ({ email: t.adminEmail, name: "Twice", role: "admin" }), cells: roles(403, 403, 403, 409, 404) },
  change("PATCH", "/api/users/[id]", ADMIN, () => ({ name: "Nobody" })),
];

export interface PageRow {
  route: string;
  at?: (things: Things) => string;
  cells: Cells;
}

/** Who is not signed in is sent to the sign-in page. */
const pages = (technician: number, lead: number, auditor: number, admin: number, limited = auditor): Cells => ({
  anonymous: 307, technician, lead, auditor, admin, disabled: 307, garbage: 307, limited,
});
const everyDesk = pages(200, 200, 200, 200);

export const PAGES: PageRow[] = [
  { route: "/", cells: anyone(307) },
  { route: "/sign-in", cells: anyone(200) },
  { route: "/verify", cells: anyone(200) },
  { route: "/help", cells: anyone(200) },
  { route: "/help/api", cells: anyone(200) },
  { route: "/help/[topic]", at: () => "/help/findings", cells: anyone(200) },
  { route: "/summary/[token]", at: () => `/summary/${"x".repeat(43)}`, cells: anyone(404) },
  { route: "/request", cells: anyone(200) },
  { route: "/request/[token]", at: () => `/request/${"x".repeat(43)}`, cells: anyone(404) },
  { route: "/request/[token]/slip", at: () => `/request/${"x".repeat(43)}/slip`, cells: anyone(404) },
  { route: "/account", cells: everyDesk },
  ...["", "/drives", "/seals", "/images", "/assessments", "/hand-outs", "/refusals", "/clock"].map((path): PageRow => ({ route: `/audit${path}`, cells: pages(404, 200, 200, 200) })),
  ...["/sign-ins", "/sign-ins/tokens", "/sign-ins/limits"].map((path): PageRow => ({ route: `/audit${path}`, cells: pages(404, 200, 200, 200, 404) })),
  { route: "/bench", cells: everyDesk },
  { route: "/cases", cells: everyDesk },
  { route: "/cases/new", cells: pages(200, 200, 307, 307) },
  { route: "/cases/[id]", at: (t) => `/cases/${t.caseId}`, cells: everyDesk },
  { route: "/cases/[id]/print", at: (t) => `/cases/${t.caseId}/print`, cells: everyDesk },
  { route: "/cases/[id]/print/[what]", at: (t) => `/cases/${t.caseId}/print/receipt`, cells: everyDesk },
  { route: "/receive", cells: pages(200, 200, 307, 307) },
  { route: "/receive/[id]", at: (t) => `/receive/${t.caseId}`, cells: pages(200, 200, 307, 307) },
  { route: "/chips/[id]", at: (t) => `/chips/${t.chipId}`, cells: everyDesk },
  { route: "/chips/[id]/compare", at: (t) => `/chips/${t.chipId}/compare?reads=1,2`, cells: everyDesk },
  { route: "/chips/[id]/decision", at: (t) => `/chips/${t.chipId}/decision`, cells: everyDesk },
  { route: "/custody", cells: everyDesk },
  { route: "/custody/workshop", cells: pages(404, 200, 200, 200, 404) },
  { route: "/items", cells: everyDesk },
  { route: "/drives/[id]", at: (t) => `/drives/${t.driveId}`, cells: everyDesk },
  { route: "/drives/[id]/custody", at: (t) => `/drives/${t.driveId}/custody`, cells: everyDesk },
  { route: "/find", cells: everyDesk },
  { route: "/outbox", cells: pages(404, 404, 404, 200) },
  { route: "/photos/[id]", at: (t) => `/photos/${t.unknown}`, cells: pages(404, 404, 404, 404) },
  { route: "/policy", cells: everyDesk },
  { route: "/shelf", cells: pages(200, 200, 200, 200, 404) },
  { route: "/shelf/[id]", at: (t) => `/shelf/${t.unknown}`, cells: pages(404, 404, 404, 404) },
  { route: "/shelf/import", cells: pages(200, 200, 404, 404) },
  { route: "/users", cells: pages(404, 404, 404, 200) },
];
