import { readdirSync, readFileSync } from "node:fs";
import path from "node:path";
import { describe, expect, it } from "vitest";
import { API_EXAMPLES } from "@/components/help/api-examples";
import { TITLE } from "@/lib/errors";
import { OPERATIONS, openApiDocument } from "@/lib/http/openapi/document";
import { API as MATRIX } from "../e2e/authorization-matrix";

const API = path.resolve(import.meta.dirname, "../../app/api");
/** What answers for itself, and what answers for addresses that lead nowhere. */
const UNDESCRIBED = ["/api/auth/{...nextauth}", "/api/{...path}"];

type Json = Record<string, unknown>;
const document = openApiDocument("1.2.3");
const paths = document.paths as Record<string, Record<string, Json>>;
const all = Object.entries(paths).flatMap(([at, methods]) => Object.entries(methods).map(([method, operation]) => ({ call: `${method.toUpperCase()} ${at}`, at, method, operation })));

/** The methods that a route file takes itself; the others come from othersThan. */
function callsOf(file: string): string[] {
  const source = readFileSync(path.join(API, file), "utf8");
  const at = path.posix.join("/api", path.dirname(file).replaceAll(path.sep, "/")).replace(/\[([^\]]+)\]/g, "{$1}");
  return [...source.matchAll(/export\s+(?:const|async function|function)\s+(GET|POST|PUT|PATCH|DELETE)\b/g)].map(([, method]) => `${method} ${at}`);
}

describe("the description of the interface", () => {
  it("has every call of every route file, and none that there is not", () => {
    const files = readdirSync(API, { recursive: true, encoding: "utf8" }).filter((name) => path.basename(name) === "route.ts");
    const there = files.flatMap(callsOf).filter((call) => !UNDESCRIBED.some((at) => call.endsWith(` ${at}`)));
    expect(there.length).toBeGreaterThan(70);
    expect(all.map(({ call }) => call).sort()).toEqual(there.sort());
    expect(OPERATIONS).toHaveLength(all.length);
  });

  it("keeps its word about each handler: the input that is described is the one that is parsed", () => {
    for (const file of readdirSync(API, { recursive: true, encoding: "utf8" }).filter((name) => path.basename(name) === "route.ts")) {
      const source = readFileSync(path.join(API, file), "utf8");
      for (const [, method, options] of source.matchAll(/export const (GET|POST|PUT|PATCH|DELETE) = handler(?:<\w+>)?\((\{[^}]*\})/g)) {
        const one = all.find(({ call }) => call === `${method} ${path.posix.join("/api", path.dirname(file)).replace(/\[([^\]]+)\]/g, "{$1}")}`);
        if (!one) continue;
        const asked = /input:|\binput\b/.test(options);
        const query = ((one.operation.parameters ?? []) as { in: string }[]).some((parameter) => parameter.in === "query");
        expect.soft(query || one.operation.requestBody !== undefined, one.call).toBe(asked);
        const status = /status: (\d+)/.exec(options)?.[1] ?? "200";
        expect.soft(Object.keys(one.operation.responses as Json), one.call).toContain(status);
      }
    }
  });

  it("names no operation twice, and says of each what it is and for whom", () => {
    const ids = all.map(({ operation }) => operation.operationId as string);
    expect(new Set(ids).size).toBe(ids.length);
    for (const { call, operation } of all) {
      expect(operation.operationId, call).toMatch(/^(get|post|put|patch|delete)[A-Z][A-Za-z]*$/);
      expect(operation.summary, call).toMatch(/^[A-Z1].*\.$/);
      expect(operation.description, call).toMatch(/^For: .+\./);
    }
  });

  it("declares each name of an address once, and only those", () => {
    for (const { call, at, operation } of all) {
      const declared = ((operation.parameters ?? []) as { name: string; in: string; required: boolean }[]).filter((one) => one.in === "path");
      expect(declared.map(({ name }) => name), call).toEqual([...at.matchAll(/\{(\w+)\}/g)].map(([, name]) => name));
      expect(declared.every(({ required }) => required), call).toBe(true);
    }
  });

  it("refers to nothing that is not there", () => {
    const references = [...JSON.stringify(document).matchAll(/"\$ref":"([^"]+)"/g)].map(([, to]) => to);
    expect(references.length).toBeGreaterThan(100);
    for (const to of new Set(references)) {
      expect(to).toMatch(/^#\//);
      expect(to.slice(2).split("/").reduce<unknown>((at, key) => (at as Json | undefined)?.[key], document), to).toBeTruthy();
    }
  });

  it("gives every call an answer and every refusal the shape of RFC 9457", () => {
    for (const { call, operation } of all) {
      const statuses = Object.keys(operation.responses as Json);
      expect(statuses.some((status) => status.startsWith("2")), call).toBe(true);
      expect(statuses, call).toContain("503");
      if (operation.security === undefined) expect(statuses, call).toEqual(expect.arrayContaining(["401", "403"]));
    }
    const { responses, schemas } = document.components as { responses: Record<string, Json>; schemas: { Problem: Json } };
    expect(Object.keys(responses).sort()).toEqual(Object.keys(TITLE).sort());
    for (const refusal of Object.values(responses)) expect(refusal.content).toEqual({ "application/problem+json": { schema: { $ref: "#/components/schemas/Problem" } } });
    expect(schemas.Problem.required).toEqual(["type", "title", "status", "detail"]);
  });

  it("says for whom a call is as the server decides it", () => {
    const ROLES = ["technician", "lead", "auditor", "admin"] as const;
    for (const { method, path: at, who } of OPERATIONS) {
      const rows = MATRIX.filter((row) => row.method === method && row.route.replace(/\[([^\]]+)\]/g, "{$1}") === at);
      expect(rows.length, `${method} ${at}`).toBe(1);
      const [{ cells }] = rows;
      const open = who === "anyone" || who === "whoever has the link";
      expect(cells.anonymous !== 401, `${method} ${at}: ${who}`).toBe(open);
      const everybody = open || who === "staff" || who === "whoever is signed in";
      const named = ROLES.filter((role) => everybody || new RegExp(`\\b${role}\\b`).test(who));
      const letIn = ROLES.filter((role) => cells[role] !== 403);
      // a role that may only on a condition ("own reads") is refused by what the matrix asks for
      if (who.includes(":")) expect(named, `${method} ${at}`).toEqual(expect.arrayContaining(letIn));
      else expect(named, `${method} ${at}`).toEqual(letIn);
    }
  });

  it("describes no input as anything at all", () => {
    for (const { call, operation } of all) {
      const content = (operation.requestBody as { content: Record<string, { schema: Json }> } | undefined)?.content;
      for (const { schema } of Object.values(content ?? {})) {
        expect(schema.type ?? schema.oneOf ?? schema.anyOf, call).toBeTruthy();
        for (const [name, one] of Object.entries((schema.properties ?? {}) as Record<string, Json>)) expect(Object.keys(one), `${call}: ${name}`).not.toEqual([]);
      }
    }
  });

  it("has the call of every example, with the status that the example shows", () => {
    for (const { key, command, status } of API_EXAMPLES) {
      const [, where] = /\$TWINREAD(\/api\/[^\s"?]*)/.exec(command)!;
      const method = /-X (\w+)/.exec(command)?.[1] ?? (/--json|-F /.test(command) ? "POST" : "GET");
      // a variable of the shell stands for one name of the address
      const shape = new RegExp(`^${where.replace(/\$[A-Z_]+/g, "\\{\\w+\\}").replace("/audit/hand-outs", "/audit/\\{list\\}")}$`);
      const one = all.find((other) => other.method.toUpperCase() === method && shape.test(other.at));
      expect(one, `${key}: ${method} ${where}`).toBeTruthy();
      expect(Object.keys(one!.operation.responses as Json), key).toContain(String(status));
    }
  });
});
