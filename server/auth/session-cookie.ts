import type { CookieOptions, Request, Response } from "express";
import { jwtVerify, SignJWT } from "jose";
import { Id } from "#shared/contract/common.ts";

export const SESSION_COOKIE = "quenchline-session";
const ISSUER = "quenchline";

/** Signs and reads the cookie that carries a session's id. Whether the session still holds is the database's to say. */
export class SessionCookie {
  private readonly key: Uint8Array;

  constructor(secret: string) {
    this.key = new TextEncoder().encode(secret);
  }

  /** What the cookie carries. */
  sign(sessionId: string, expiresAt: Date): Promise<string> {
    return new SignJWT({})
      .setProtectedHeader({ alg: "HS256" })
      .setIssuer(ISSUER)
      .setSubject(sessionId)
      .setExpirationTime(expiresAt)
      .sign(this.key);
  }

  async set(response: Response, sessionId: string, expiresAt: Date): Promise<void> {
    const token = await this.sign(sessionId, expiresAt);
    response.cookie(SESSION_COOKIE, token, { ...attributes(response.req), expires: expiresAt });
  }

  clear(response: Response): void {
    response.clearCookie(SESSION_COOKIE, attributes(response.req));
  }

  /** The session's id; undefined without a cookie, or with one that this server did not sign or that has expired. */
  async read(request: Request, now: Date): Promise<string | undefined> {
    const token = cookieNamed(SESSION_COOKIE, request.headers.cookie);
    if (token === undefined) return undefined;
    try {
      const { payload } = await jwtVerify(token, this.key, {
        algorithms: ["HS256"],
        issuer: ISSUER,
        currentDate: now,
      });
      return Id.safeParse(payload.sub).data;
    } catch {
      return undefined;
    }
  }
}

/** Scripts can't read the cookie, other sites' forms don't send it. */
function attributes(request: Request): CookieOptions {
  return { httpOnly: true, sameSite: "lax", path: "/", secure: request.secure };
}

function cookieNamed(name: string, header = ""): string | undefined {
  for (const pair of header.split(";")) {
    const at = pair.indexOf("=");
    if (at > 0 && pair.slice(0, at).trim() === name) return pair.slice(at + 1).trim();
  }
  return undefined;
}
