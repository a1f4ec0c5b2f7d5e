import { vi } from "vitest";

/** What a fake server answers: an object is sent as JSON with 200, a Response as it is. */
type Answer = (request: { body: unknown; url: URL; params: string[] }) => unknown;

/**
 * Stands in for the server. Routes are `"METHOD /path"`, where `*` takes one segment of the path; whatever is not listed
 * fails the test that asks for it.
 */
export function fakeServer(routes: Record<string, Answer>) {
  const seen: string[] = [];
  const patterns = Object.entries(routes).map(([route, answer]) => {
    const [method, path] = route.split(" ");
    return { method, pattern: new RegExp(`^${path.replaceAll("*", "([^/]+)")}$`), answer };
  });
  const answer = async (input: string, init: RequestInit = {}): Promise<Response> => {
    const url = new URL(input, "http://localhost");
    const method = init.method ?? "GET";
    seen.push(`${method} ${url.pathname}`);
    for (const route of patterns) {
      const match = route.method === method && route.pattern.exec(url.pathname);
      if (!match) continue;
      const body = init.body === undefined ? undefined : JSON.parse(String(init.body));
      const said = await route.answer({ body, url, params: match.slice(1) });
      return said instanceof Response ? said : Response.json(said ?? null);
    }
    throw new Error(`No answer for ${method} ${url.pathname}`);
  };
  vi.stubGlobal("fetch", vi.fn(answer));
  return { seen };
}

/** A problem document, as the server sends it. */
export function problem(status: number, code: string, more: object = {}): Response {
  const body = { type: "about:blank", title: "Title", status, detail: "Detail.", code, ...more };
  return new Response(JSON.stringify(body), { status, headers: { "content-type": "application/problem+json" } });
}

export const SESSION = {
  user: { id: "0b4cf6f0-1f6f-4a3a-8d52-5d8a2f0f7b01", email: "lead@alderbay.example", role: "lead" as const },
  team: { id: "0b4cf6f0-1f6f-4a3a-8d52-5d8a2f0f7b02", name: "Alder Bay Instruments" },
};
