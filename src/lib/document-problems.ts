import type { z } from "zod";
import { explainIssues } from "#shared/formats/explain.ts";
import type { Problem } from "#shared/formats/problems.ts";

/** What is wrong with a document, by place. */
export class DocumentProblems {
  readonly all: readonly Problem[];

  constructor(problems: readonly Problem[]) {
    this.all = problems.map(({ path, message }) => ({ path: plainPath(path), message }));
  }

  /** The first message about exactly this place. */
  at(path: string): string | undefined {
    const wanted = plainPath(path);
    return this.all.find((problem) => problem.path === wanted)?.message;
  }

  /** Everything about this place and what lies within it. */
  within(path: string): Problem[] {
    const wanted = plainPath(path);
    return this.all.filter(
      (problem) =>
        problem.path === wanted || (/^[.[]/.test(problem.path.slice(wanted.length)) && problem.path.startsWith(wanted)),
    );
  }
}

/**
 * What the schema finds wrong, and, where the schema is content, what a further check does.
 */
export function findProblems<Document>(
  schema: z.ZodType<Document>,
  draft: unknown,
  check: (document: Document) => readonly Problem[] = () => [],
): { problems: DocumentProblems; document: Document | undefined } {
  const result = schema.safeParse(draft);
  if (!result.success) {
    return { problems: new DocumentProblems(explainIssues(result.error.issues, draft)), document: undefined };
  }
  const problems = check(result.data);
  return { problems: new DocumentProblems(problems), document: problems.length === 0 ? result.data : undefined };
}

/** The only rule of a side is named with or without its index. */
function plainPath(path: string): string {
  return path.replace(/\b(cooling|heating)\[0\]/g, "$1");
}
