import { problem } from "./problem";

const METHODS = ["GET", "POST", "PUT", "PATCH", "DELETE"] as const;
type Method = (typeof METHODS)[number];
type Handlers = Record<Method | "OPTIONS", () => Response>;

/** For a route that takes these methods alone: what to export for the others, so that 405 says which ones it takes (RFC 9110, 15.5.6). */
export function othersThan(...taken: Method[]): Handlers {
  const allow = [...taken, ...(taken.includes("GET") ? ["HEAD"] : []), "OPTIONS"].join(", ");
  const refuse = () => {
    const response = problem("method-not-allowed", `This address takes ${taken.join(", ")} only. Check the method.`);
    response.headers.set("allow", allow);
    return response;
  };
  return {
    ...(Object.fromEntries(METHODS.map((method) => [method, refuse])) as Record<Method, () => Response>),
    OPTIONS: () => new Response(null, { status: 204, headers: { allow } }),
  };
}
