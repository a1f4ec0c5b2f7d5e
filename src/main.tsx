import "@fontsource/jetbrains-mono/latin-400.css";
import "@fontsource/jetbrains-mono/latin-700.css";
import "#src/app/styles.css";
import { StrictMode } from "react";
import { createRoot } from "react-dom/client";
import { z } from "zod";
import { App } from "#src/app/app.tsx";
import { restoreSheet } from "#src/lib/sheet.ts";

// The page's content policy forbids code made from text, which zod would try.
z.config({ jitless: true });
restoreSheet();

const root = document.getElementById("root");
if (root)
  createRoot(root).render(
    <StrictMode>
      <App />
    </StrictMode>,
  );
