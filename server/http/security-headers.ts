import type { RequestHandler } from "express";
import helmet from "helmet";

/** Everything comes from this server; the editor of the diff sets styles on elements. */
export function securityHeaders(): RequestHandler {
  return helmet({
    contentSecurityPolicy: {
      useDefaults: false,
      directives: {
        defaultSrc: ["'self'"],
        styleSrc: ["'self'", "'unsafe-inline'"],
        objectSrc: ["'none'"],
        baseUri: ["'none'"],
        formAction: ["'self'"],
        frameAncestors: ["'none'"],
      },
    },
    xFrameOptions: { action: "deny" },
    // The server is often reached by plain HTTP inside a workshop's network; a proxy that adds TLS adds this too.
    strictTransportSecurity: false,
  });
}
