// Runs before the first paint: the chosen theme, or the system's.
(() => {
  let chosen = null;
  try {
    chosen = localStorage.getItem("tangency-theme");
  } catch {
    // A browser that keeps nothing follows the system.
  }
  const dark = chosen ? chosen === "dark" : matchMedia("(prefers-color-scheme: dark)").matches;
  document.documentElement.dataset.theme = dark ? "dark" : "light";
})();
