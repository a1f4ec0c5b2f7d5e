import "@fontsource/jetbrains-mono/latin-400.css";
import "@fontsource/jetbrains-mono/latin-700.css";
import "#src/app/styles.css";
import { StrictMode } from "react";
import { createRoot } from "react-dom/client";
import { App } from "#src/app/app.tsx";
import { restoreSheet } from "#src/lib/sheet.ts";

export function start(): void {
  restoreSheet();
  const root = document.getElementById("root");
  if (!root) return;
  createRoot(root).render(
    <StrictMode>
      <App />
    </StrictMode>,
  );
}
