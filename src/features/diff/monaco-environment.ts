import "monaco-editor/features/diffEditor/register";
import "monaco-editor/features/codicon/register";
import "monaco-editor/features/find/register";
import "monaco-editor/features/folding/register";
import EditorWorker from "monaco-editor/editor/editor.worker?worker";

// The editor compares in a worker of ours; nothing is fetched from elsewhere.
self.MonacoEnvironment = { getWorker: () => new EditorWorker() };
