import { z } from "zod";
import { STATUS, TITLE, type ErrorCode } from "@/lib/errors";
import { HOUSE_OPERATIONS } from "./house-operations";
import type { Operation } from "./operation";
import { READ_OPERATIONS } from "./read-operations";
import { WORK_OPERATIONS } from "./work-operations";

export const OPERATIONS: readonly Operation[] = [...WORK_OPERATIONS, ...READ_OPERATIONS, ...HOUSE_OPERATIONS];

type Json = Record<string, unknown>;

/** OpenAPI 3.1 takes JSON Schema 2020-12 as it is. `io`: what is sent, or what comes back. */
function schemaOf(schema: z.ZodType, io: "input" | "output"): Json {
  const { $schema: _dialect, ...rest } = z.toJSONSchema(schema, { io, unrepresentable: "any", target: "draft-2020-12" });
  return rest;
}

const properties = (schema: Json) => (schema.properties ?? {}) as Record<string, Json>;
const requiredOf = (schema: Json) => (schema.required ?? []) as string[];

/** `{name}` in the address; all but two are ids. */
function pathParameters(path: string): Json[] {
  return [...path.matchAll(/\{([a-z]+)\}/g)].map(([, name]) => ({
    name, in: "path", required: true, schema: name === "number" ? { type: "integer", minimum: 1 } : name === "id" ? { type: "string", format: "uuid" } : { type: "string" },
  }));
}

function queryParameters({ query }: Operation): Json[] {
  if (!query) return [];
  const schema = schemaOf(query, "input");
  return Object.entries(properties(schema)).map(([name, one]) => ({ name, in: "query", required: requiredOf(schema).includes(name), schema: one }));
}

const changes = ({ method }: Operation) => method !== "GET";

const KEY = { name: "Idempotency-Key", in: "header", required: false, description: "Yours to choose; the same call again under it is done once.", schema: { type: "string", maxLength: 200 } };

function multipartSchema({ file, optional, fields }: NonNullable<Operation["multipart"]>): Json {
  const sent = fields ? schemaOf(fields, "input") : {};
  // files may stand before or after the fields, and the part is repeated for each
  const files = { type: "array", minItems: optional ? 0 : 1, items: { type: "string", contentMediaType: "application/octet-stream" } };
  return { type: "object", properties: { ...properties(sent), [file]: files }, required: [...requiredOf(sent), ...(optional ? [] : [file])] };
}

function bodyOf({ body, multipart }: Operation): Json {
  if (body) return { requestBody: { required: true, content: { "application/json": { schema: schemaOf(body, "input") } } } };
  if (multipart) return { requestBody: { required: true, content: { "multipart/form-data": { schema: multipartSchema(multipart) } } } };
  return {};
}

const DONE: Record<number, string> = { 200: "Done.", 201: "Made." };

function answerOf({ answer, media, status }: Operation): Json {
  const json = answer ? { "application/json": { schema: schemaOf(answer, "output") } } : media ? {} : { "application/json": { schema: {} } };
  const files = Object.fromEntries((media ?? []).map((type) => [type, { schema: type.startsWith("text/") ? { type: "string" } : { type: "string", contentMediaType: type } }]));
  return { [status]: { description: DONE[status], content: { ...json, ...files } } };
}

/** The refusals that this call can give, by what it takes. */
function refusalsOf(one: Operation): ErrorCode[] {
  const open = isOpen(one);
  return [
    ...(changes(one) ? (["malformed"] as const) : []), ...(open ? [] : (["not-signed-in", "forbidden"] as const)), ...(one.path.includes("{") ? (["not-found"] as const) : []),
    ...(changes(one) ? (["rule-against"] as const) : []), ...(one.body || one.multipart ? (["too-large", "wrong-media-type"] as const) : []),
    ...(one.body || one.multipart || one.query || changes(one) ? (["does-not-fit"] as const) : []), ...(changes(one) ? (["too-many"] as const) : []), "unavailable",
    ...(one.multipart ? (["no-room"] as const) : []),
  ];
}

const isOpen = ({ who }: Operation) => who === "anyone" || who === "whoever has the link";

function operation(one: Operation): Json {
  const parameters = [...pathParameters(one.path), ...queryParameters(one), ...(changes(one) && !one.once ? [KEY] : [])];
  return {
    summary: one.summary,
    description: `For: ${one.who}.${one.stable ? "" : " Made for the pages: it may change with them."}`,
    operationId: `${one.method.toLowerCase()}${one.path.replace(/^\/api/, "").replace(/[^A-Za-z]+([A-Za-z])?/g, (_, letter: string | undefined) => letter?.toUpperCase() ?? "")}`,
    tags: [one.stable ? "stable" : "pages"],
    ...(isOpen(one) ? { security: [] } : {}),
    ...(parameters.length > 0 ? { parameters } : {}),
    ...bodyOf(one),
    responses: { ...answerOf(one), ...Object.fromEntries(refusalsOf(one).map((code) => [STATUS[code], { $ref: `#/components/responses/${code}` }])) },
  };
}

const problemSchema = z.object({
  type: z.string(), title: z.string(), status: z.int(), detail: z.string(), errors: z.array(z.object({ path: z.string(), message: z.string() })).optional(),
});

const WAIT: readonly ErrorCode[] = ["too-many", "unavailable"];

function refusal(code: ErrorCode): Json {
  return {
    description: `${TITLE[code]}.`,
    ...(WAIT.includes(code) ? { headers: { "Retry-After": { description: "Seconds to wait.", schema: { type: "integer" } } } } : {}),
    content: { "application/problem+json": { schema: { $ref: "#/components/schemas/Problem" } } },
  };
}

/** The interface as OpenAPI 3.1: inputs from the zod schemas that the handlers parse with, answers from those of answers.ts. */
export function openApiDocument(version: string): Json {
  const paths: Record<string, Json> = {};
  for (const one of OPERATIONS) paths[one.path] = { ...paths[one.path], [one.method.toLowerCase()]: operation(one) };
  return {
    openapi: "3.1.1",
    info: {
      title: "Twinread", version,
      description: "The vault and the conscience of the chip transfer bench. Calls tagged stable stay as they are. Names are in camelCase, sizes in bytes, digests in lower-case hex, times RFC 3339 in UTC. Errors are RFC 9457 problems.",
    },
    servers: [{ url: "/" }],
    security: [{ benchToken: [] }, { session: [] }],
    tags: [{ name: "stable", description: "Scripts may rely on these." }, { name: "pages", description: "Made for the pages; they may change with them." }],
    paths,
    components: {
      securitySchemes: {
        benchToken: { type: "http", scheme: "bearer", description: "A bench token: made on the account page, shown once. Cookies are then ignored." },
        session: { type: "apiKey", in: "cookie", name: "next-auth.session-token", description: "The session of the web sign-in. Changes need the own Origin, too." },
      },
      schemas: { Problem: schemaOf(problemSchema, "output") },
      responses: Object.fromEntries((Object.keys(STATUS) as ErrorCode[]).map((code) => [code, refusal(code)])),
    },
  };
}
