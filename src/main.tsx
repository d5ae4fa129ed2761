import { StrictMode } from "react";
import { createRoot } from "react-dom/client";
import { Application } from "./app/application.tsx";
import { followTheme } from "./lib/theme.ts";
import "./styles/index.css";

followTheme();
const root = document.getElementById("root");
if (root) {
  createRoot(root).render(
    <StrictMode>
      <Application />
    </StrictMode>,
  );
}
