/** Where a text stops being JSON: offset in UTF-16 units, and what would have been right there. */
export interface JsonError {
  offset: number;
  expected: string;
}

/**
 * Finds the first place at which a text is not JSON (RFC 8259). Meant for a text that JSON.parse has rejected; for a
 * valid one the place is its end.
 */
export function findJsonError(text: string): JsonError {
  return new JsonScan(text).firstError();
}

const SPACE = /[ \t\r\n]*/y;
const ESCAPE = /\\(?:["\\/bfnrt]|u[0-9a-fA-F]{4})/y;
const LITERAL = /(?:-?(?:0|[1-9]\d*)(?:\.\d+)?(?:[eE][+-]?\d+)?|true|false|null)(?![\w.+-])/y;

/** Every step advances past what is right and returns undefined, or returns the error where it stands. */
class JsonScan {
  private readonly text: string;
  private at = 0;
  /** closing brackets that are due, innermost last: a list, so that depth of nesting does no harm */
  private readonly due: ("}" | "]")[] = [];
  private valueDue = true;

  constructor(text: string) {
    this.text = text;
  }

  firstError(): JsonError {
    for (;;) {
      this.skip(SPACE);
      const error = this.valueDue ? this.value() : this.afterValue();
      if (error) return error;
    }
  }

  private value(): JsonError | undefined {
    const next = this.text[this.at];
    if (next === "{" || next === "[") return this.opened(next === "{" ? "}" : "]");
    this.valueDue = false;
    if (next === '"') return this.string();
    return this.skip(LITERAL) ? undefined : this.stop("a value was expected");
  }

  private opened(closing: "}" | "]"): JsonError | undefined {
    this.at++;
    this.skip(SPACE);
    this.due.push(closing);
    // An empty object or list is as good as a value that has just ended.
    if (this.text[this.at] === closing) this.valueDue = false;
    else if (closing === "}") return this.key();
    return undefined;
  }

  private afterValue(): JsonError | undefined {
    const closing = this.due[this.due.length - 1];
    if (closing === undefined) return this.stop("the end of the text was expected");
    const next = this.text[this.at];
    if (next === closing) {
      this.at++;
      this.due.pop();
      return undefined;
    }
    if (next !== ",") return this.stop(`"," or "${closing}" was expected`);
    this.at++;
    this.skip(SPACE);
    this.valueDue = true;
    return closing === "}" ? this.key() : undefined;
  }

  /** `"name":` of an object's field */
  private key(): JsonError | undefined {
    if (this.text[this.at] !== '"') return this.stop("a field name in double quotes was expected");
    const error = this.string();
    if (error) return error;
    this.skip(SPACE);
    if (this.text[this.at] !== ":") return this.stop('":" was expected after the field name');
    this.at++;
    return undefined;
  }

  private string(): JsonError | undefined {
    this.at++;
    for (;;) {
      const next = this.text[this.at];
      if (next === "\\") {
        if (!this.skip(ESCAPE)) return this.stop("a valid escape such as \\n or \\\\ was expected");
      } else if (next === undefined || next < " ") return this.stop('a closing " was expected');
      else {
        this.at++;
        if (next === '"') return undefined;
      }
    }
  }

  private skip(pattern: RegExp): boolean {
    pattern.lastIndex = this.at;
    const matched = pattern.test(this.text);
    if (matched) this.at = pattern.lastIndex;
    return matched;
  }

  private stop(expected: string): JsonError {
    return { offset: this.at, expected };
  }
}
