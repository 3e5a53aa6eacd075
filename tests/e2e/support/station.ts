import { expect } from "@playwright/test";
import { emailOf, type Person, passwordOf } from "./accounts";

/** The API as a bench station sees it: plain requests, no browser. */
export const appUrl = (): string => `http://127.0.0.1:${process.env.E2E_PORT ?? "3210"}`;

export interface Problem {
  type: string;
  title: string;
  status: number;
  detail: string;
  errors?: { path: string; message: string }[];
}

export interface Answer {
  status: number;
  headers: Headers;
  bytes: Buffer;
  json<T>(): T;
}

export interface Request {
  token?: string;
  cookie?: string;
  json?: unknown;
  body?: BodyInit;
  headers?: Record<string, string>;
  /** another server than the one under test */
  base?: string;
}

export async function call(method: string, path: string, { token, cookie, json, body, headers = {}, base = appUrl() }: Request = {}): Promise<Answer> {
  const response = await fetch(`${base}${path}`, {
    method, redirect: "manual", body: json === undefined ? body : JSON.stringify(json),
    headers: {
      ...(json === undefined ? {} : { "content-type": "application/json" }), ...(token ? { authorization: `Bearer ${token}` } : {}),
      ...(cookie ? { cookie } : {}), ...headers,
    },
  });
  const bytes = Buffer.from(await response.arrayBuffer());
  return { status: response.status, headers: response.headers, bytes, json: <T>() => JSON.parse(bytes.toString("utf8")) as T };
}

/** A change from one of our own pages: the session's cookie and our own Origin. */
export const fromPage = (cookie: string) => ({ cookie, headers: { origin: appUrl() } });

/** The answer of a call that must go well. */
export async function done<T>(method: string, path: string, request: Request, status = method === "POST" ? 201 : 200): Promise<T> {
  const answer = await call(method, path, request);
  expect(answer.status, `${method} ${path}: ${answer.bytes.toString("utf8").slice(0, 500)}`).toBe(status);
  return answer.json<T>();
}

const TITLE = /^[A-Z]/;

/** Every refusal has one shape (RFC 9457) and a sentence for people; gives the sentence. */
export function expectProblem(answer: Answer, status: number, detail: RegExp): Problem {
  const text = answer.bytes.toString("utf8");
  expect(answer.status, text.slice(0, 500)).toBe(status);
  expect(answer.headers.get("content-type")).toBe("application/problem+json");
  const problem = JSON.parse(text) as Problem;
  expect(Object.keys(problem).filter((key) => key !== "errors")).toEqual(["type", "title", "status", "detail"]);
  expect(problem).toMatchObject({ type: "about:blank", status, title: expect.stringMatching(TITLE) });
  expect(problem.detail).toMatch(detail);
  for (const error of problem.errors ?? []) expect(error).toEqual({ path: expect.any(String), message: expect.any(String) });
  return problem;
}

const cookiesOf = (headers: Headers) => headers.getSetCookie().map((line) => line.split(";")[0]).filter((pair) => !pair.endsWith("="));

/** What the sign-in page does; `address` stands for the computer it comes from. */
export async function trySignIn(email: string, password: string, { address, base }: { address?: string; base?: string } = {}): Promise<Answer & { cookie: string }> {
  const first = await call("GET", "/api/auth/csrf", { base });
  const answer = await call("POST", "/api/auth/callback/credentials", {
    base, cookie: cookiesOf(first.headers).join("; "),
    headers: { "content-type": "application/x-www-form-urlencoded", ...(address ? { "x-forwarded-for": address } : {}) },
    body: new URLSearchParams({ csrfToken: first.json<{ csrfToken: string }>().csrfToken, email, password, json: "true" }).toString(),
  });
  return { ...answer, cookie: cookiesOf(answer.headers).filter((pair) => pair.includes("session-token=")).join("; ") };
}

/** Signs in and gives the session's cookie. */
export async function sessionOf(email: string, password: string): Promise<string> {
  const answer = await trySignIn(email, password);
  expect(answer.status, answer.bytes.toString("utf8")).toBe(200);
  expect(answer.cookie).toContain("session-token=");
  return answer.cookie;
}

export async function makeToken(cookie: string, name: string): Promise<{ id: string; token: string }> {
  return done("POST", "/api/account/tokens", { ...fromPage(cookie), json: { name } });
}

const tokens = new Map<Person, Promise<string>>();

/** A bench token of one of the demo's people, made once. */
export function tokenOf(person: Person): Promise<string> {
  const made = tokens.get(person) ?? sessionOf(emailOf(person), passwordOf(person)).then(async (cookie) => (await makeToken(cookie, "API tests")).token);
  tokens.set(person, made);
  return made;
}
