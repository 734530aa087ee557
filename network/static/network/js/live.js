// Sends an unfinished form to the server while it is typed and shows what it answers. The server
// computes; where there is no script the button "Compute" asks the same.
(() => {
  "use strict";
  const answer = document.querySelector("[data-live]");
  const form = answer?.closest("form");
  if (!form) return;
  let timer = 0;
  let running = null;

  const typed = () => {
    const data = new FormData(form);
    for (const [name, value] of [...data]) if (value instanceof File) data.delete(name);
    return data;
  };

  const fieldOf = (name) => form.querySelector(`[name="${CSS.escape(name)}"], [name="${CSS.escape(name)}_0"]`);

  // Write a stage or a finding under its field; the list at the foot stays for those without script.
  const write = (name, text, kind) => {
    const field = fieldOf(name);
    const cell = field?.closest("td, .form-row");
    if (!cell || !text) return;
    const said = document.createElement("p");
    said.className = `beside ${kind}`;
    said.textContent = text;
    cell.append(said);
    if (kind === "finding") field.setAttribute("aria-invalid", "true");
  };

  const mark = () => {
    form.querySelectorAll(".beside").forEach((said) => said.remove());
    form.querySelectorAll("[aria-invalid]").forEach((field) => field.removeAttribute("aria-invalid"));
    answer.querySelectorAll("[data-beside]").forEach((item) => write(item.dataset.beside, `= ${item.textContent}`, "stage"));
    answer.querySelectorAll("[data-cell]").forEach((item) => write(item.dataset.cell, item.textContent, "finding"));
  };

  const ask = async () => {
    running?.abort();
    running = new AbortController();
    try {
      const response = await fetch(answer.dataset.live, { method: "POST", body: typed(), signal: running.signal });
      if (!response.ok || response.redirected) return;
      answer.innerHTML = await response.text();
      answer.classList.remove("stale");
      mark();
    } catch { /* offline, or overtaken by the next key: the last answer stays, marked as old */ }
  };

  const soon = () => {
    answer.classList.add("stale");
    clearTimeout(timer);
    timer = setTimeout(ask, 250);
  };

  form.addEventListener("input", soon);
  form.addEventListener("change", soon);
  form.addEventListener("submit", () => { clearTimeout(timer); running?.abort(); });
  document.querySelector("[name=_compute]")?.setAttribute("hidden", "");
  mark();
})();
