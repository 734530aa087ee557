// The gauging sheet: lines added and pasted, the server's answer while typing. It computes nothing.
(() => {
  "use strict";
  const group = document.getElementById("rows-group");
  const answer = document.getElementById("answer");
  const form = answer && answer.closest("form");
  if (!form || !form.querySelector("[name=csrfmiddlewaretoken]") || !form.querySelector("[name=_compute]")) return;

  const lines = () => [...group.querySelectorAll(".line")];
  const visible = (field) => field.offsetParent !== null;

  // --- lines ------------------------------------------------------------------------------------
  const renumber = () => {
    lines().forEach((line, number) => {
      line.dataset.line = number;
      line.querySelector(".found").dataset.for = number;
      for (const field of line.querySelectorAll("[name]")) {
        field.name = field.name.replace(/^rows-\d+-/, `rows-${number}-`);
        field.id = `id_${field.name}`;
        field.closest(".cell")?.querySelector("label")?.setAttribute("for", field.id);
      }
    });
    group.querySelector("[name=rows-TOTAL_FORMS]").value = lines().length;
  };

  const setPoints = (line) => {
    const chosen = line.querySelector(".point-set select").value;
    const box = line.querySelector(".points");
    const fractions = chosen === "given" || chosen === "" ? [] : chosen.split(" ");
    const kept = [...box.querySelectorAll("input")].map((field) => field.value);
    box.replaceChildren(...fractions.map((fraction, place) => {
      const point = document.getElementById("point-template").content.cloneNode(true).firstElementChild;
      const names = { 0: box.dataset.surface, 1: box.dataset.bed };
      point.querySelector(".fraction").textContent = names[fraction] || fraction;
      point.querySelectorAll("input").forEach((field, cell) => {
        field.name = `rows-${line.dataset.line}-p${place}-${field.dataset.cell}`;
        field.id = `id_${field.name}`;
        field.value = kept[place * 3 + cell] || "";
      });
      return point;
    }));
    line.classList.toggle("is-given", chosen === "given");
  };

  const setKind = (line) => {
    const edge = line.querySelector(".kind select").value === "edge";
    line.classList.toggle("is-edge", edge);
    line.classList.toggle("is-vertical", !edge);
  };

  const blankLine = (kind, like) => {
    const line = like.cloneNode(true);
    line.querySelectorAll("input").forEach((field) => { field.value = ""; field.removeAttribute("aria-invalid"); });
    line.querySelectorAll(".errorlist").forEach((list) => list.remove());
    line.querySelector(".found").replaceChildren();
    line.querySelector("details").open = false;
    line.querySelector(".kind select").value = kind;
    line.querySelector(".point-set select").value = like.querySelector(".point-set select").value;
    setKind(line);
    return line;
  };

  const addVertical = () => {
    const all = lines();
    const last = all.at(-1);
    const like = all.filter((line) => line.classList.contains("is-vertical")).at(-1) || last;
    const line = blankLine("vertical", like);
    if (last.classList.contains("is-edge") && all.length > 1) last.before(line);
    else last.after(line);
    renumber();
    setPoints(line);
    return line;
  };

  const addChannel = () => {
    const like = lines().at(-1);
    for (const kind of ["edge", "vertical", "vertical", "vertical", "edge"]) {
      const line = blankLine(kind, like);
      lines().at(-1).after(line);
      renumber();
      setPoints(line);
    }
    soon();
  };

  // --- pasting from a spreadsheet -----------------------------------------------------------------
  const cellsOf = (line) => [...line.querySelectorAll("input")].filter(
    (field) => visible(field) && !field.closest("details"));

  const paste = (event) => {
    const text = event.clipboardData.getData("text/plain").replace(/\r/g, "").replace(/\n+$/, "");
    if (!event.target.matches(".line input") || !/[\t\n]/.test(text)) return;
    event.preventDefault();
    let line = event.target.closest(".line");
    const offset = cellsOf(line).indexOf(event.target);
    for (const row of text.split("\n")) {
      line = line || addVertical();
      const cells = cellsOf(line);
      row.split("\t").forEach((value, column) => {
        const field = cells[offset + column];
        if (field) field.value = value.trim();
      });
      line = nextFor(line);
    }
    event.target.dispatchEvent(new Event("input", { bubbles: true }));
  };

  // A paste fills verticals; the edge that ends the channel moves down.
  const nextFor = (line) => {
    const next = line.nextElementSibling;
    if (next && next.classList.contains("is-vertical")) return next;
    if (line.classList.contains("is-edge") && !next) return null;
    return null;
  };

  // --- the server's answer --------------------------------------------------------------------------
  let timer = 0;
  let running = null;
  const soon = () => { clearTimeout(timer); timer = setTimeout(ask, 250); };

  const ask = async () => {
    running?.abort();
    running = new AbortController();
    const body = new URLSearchParams();
    for (const [name, value] of new FormData(form)) if (typeof value === "string") body.append(name, value);
    try {
      const response = await fetch(answer.dataset.url, { method: "POST", body, signal: running.signal });
      if (!response.ok) return;
      const found = await response.json();
      answer.innerHTML = found.answer;
      delete answer.dataset.old;
      showLines(found.lines);
      glance();
    } catch (error) {
      if (error.name !== "AbortError") answer.dataset.old = "1";
    }
  };

  // On a phone the figures stand far below the line that is typed: the bar at the foot repeats them.
  const glance = () => {
    const link = form.querySelector(".glance");
    const figure = answer.querySelector("[data-figure=discharge]");
    link.hidden = !figure;
    link.textContent = figure ? figure.textContent.trim().replace(/\s+/g, " ") : "";
  };

  const showLines = (html) => {
    if (!group) return;
    const parts = new DOMParser().parseFromString(html, "text/html");
    group.querySelectorAll(".found").forEach((box) => {
      const part = parts.querySelector(`[data-for="${box.dataset.for}"]`);
      box.replaceChildren(...(part ? part.childNodes : []));
    });
    group.querySelectorAll("[aria-invalid]").forEach((field) => field.removeAttribute("aria-invalid"));
    answer.querySelectorAll("[data-cell]").forEach((item) => {
      form.elements[item.dataset.cell]?.setAttribute?.("aria-invalid", "true");
    });
  };

  // --- what the page listens to -----------------------------------------------------------------------
  form.addEventListener("input", soon);
  form.addEventListener("change", soon);
  form.addEventListener("submit", () => { clearTimeout(timer); running?.abort(); });
  if (!group) { soon(); return; }

  const noted = document.getElementById("id_noted");
  const setNoted = () => { group.dataset.noted = noted.value; };
  const typed = (name) => [...group.querySelectorAll(`.points [name$="${name}"]`)].some((field) => field.value);
  if (typed("velocity_ms")) noted.value = typed("revolutions") ? "both" : "velocities";
  noted.addEventListener("change", setNoted);
  setNoted();

  group.addEventListener("input", (event) => {
    const line = event.target.closest(".line");
    if (!line) return;
    if (event.target.matches(".point-set select")) setPoints(line);
    if (event.target.matches(".kind select")) setKind(line);
  });
  group.addEventListener("paste", paste);
  const add = group.querySelector(".add-row a");
  const channel = group.querySelector(".add-channel");
  add.hidden = channel.hidden = false;
  group.querySelector(".more-rows").hidden = true;
  add.addEventListener("click", (event) => {
    event.preventDefault();
    const line = addVertical();
    if (event.isTrusted) line.querySelector("input").focus();
  });
  channel.addEventListener("click", addChannel);
  renumber();
  soon();
})();
