import { documentDigest } from "#server/cli/documents.ts";
import type { ToolpathInput } from "#server/cli/input-stream.ts";
