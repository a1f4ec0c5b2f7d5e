import { z } from "zod";

/** Body of every reply that is no success: RFC 9457, `application/problem+json`. */
export const Problem = z.object({
  /** `about:blank`, or a path under which the code is explained */
  type: z.string(),
  title: z.string(),
  status: z.int(),
  detail: z.string(),
  /** stable kebab-case identifier */
  code: z.string(),
  /** what the person can do about it */
  remedy: z.string().optional(),
  /** what is wrong with the request, field by field; paths as in `body.document.zones[1].cooling` */
  errors: z.array(z.object({ path: z.string(), message: z.string() })).optional(),
  /** where in a file or document */
  place: z.object({ line: z.int().optional(), layer: z.int().optional(), path: z.string().optional() }).optional(),
  /** of a fault of ours: names the entry in the server's log */
  id: z.string().optional(),
});
export type Problem = z.infer<typeof Problem>;

export const PROBLEM_TYPE = "application/problem+json";
