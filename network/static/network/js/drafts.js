// Keeps unfinished forms on this device under their UUID; sends each form once, and only when
// the server answers. Words come from the attributes of this script's own tag.
(() => {
  "use strict";
  const script = document.currentScript;
  const words = script.dataset;
  const PREFIX = "draft:";
  const here = location.pathname + location.search;

  const drafts = () => Object.keys(localStorage).filter((key) => key.startsWith(PREFIX)).map((key) => {
    try { return { key, ...JSON.parse(localStorage.getItem(key)) }; } catch { return { key }; }
  });

  // The server names the form it saved in a cookie; its draft has served.
  const forgetSaved = () => {
    const saved = /(?:^|; )saved_form=([\w-]+)/.exec(document.cookie);
    if (!saved) return;
    localStorage.removeItem(PREFIX + saved[1]);
    document.cookie = "saved_form=; path=/; max-age=0; samesite=Lax";
  };

  const kept = (field) => field.name && field.name !== "csrfmiddlewaretoken" &&
    !["file", "password", "submit", "button", "fieldset"].includes(field.type);

  const read = (form) => [...form.elements].filter(kept).map((field) => {
    if (["checkbox", "radio"].includes(field.type)) return [field.name, field.value, field.checked];
    if (field.multiple) return [field.name, [...field.selectedOptions].map((option) => option.value)];
    return [field.name, field.value];
  });

  const fill = (form, values) => {
    for (const [name, total] of values) {
      if (name.endsWith("-TOTAL_FORMS")) addRows(form, name.slice(0, -12), Number(total));
    }
    for (const [name, value, checked] of values) {
      const fields = [...form.elements].filter((field) => field.name === name && kept(field));
      const field = fields.find((one) => checked === undefined || one.value === value);
      if (!field) continue;
      if (checked !== undefined) field.checked = checked;
      else if (Array.isArray(value)) {
        for (const option of field.options) option.selected = value.includes(option.value);
      } else field.value = value;
      if (name !== "form_id") field.dispatchEvent(new Event("input", { bubbles: true }));
    }
  };

  const addRows = (form, prefix, wanted) => {
    const total = form.querySelector(`[name="${prefix}-TOTAL_FORMS"]`);
    for (let tries = 0; total && Number(total.value) < wanted && tries < 500; tries += 1) {
      const add = document.querySelector(`#${prefix}-group .add-row a`);
      if (!add) return;
      add.click();
    }
  };

  const notice = (form, kind, text) => {
    form.querySelector(`.draft-notice.${kind}`)?.remove();
    const box = document.createElement("p");
    box.className = `draft-notice ${kind}`;
    box.setAttribute("role", "status");
    box.textContent = text;
    form.prepend(box);
    box.scrollIntoView({ block: "nearest" });
    return box;
  };

  const restore = (form) => {
    const own = form.elements.form_id.value;
    const found = drafts().filter((draft) => draft.page === here)
      .sort((one, other) => Number(other.key === PREFIX + own) - Number(one.key === PREFIX + own) || other.at - one.at)[0];
    if (!found || !found.values) return;
    fill(form, found.values);
    const discard = document.createElement("button");
    discard.type = "button";
    discard.textContent = words.discard;
    discard.addEventListener("click", () => {
      localStorage.removeItem(found.key);
      form.dataset.discarded = "1";
      location.reload();
    });
    notice(form, "restored", words.restored).append(" ", discard);
  };

  const keep = (form) => {
    if (form.dataset.discarded) return;
    const draft = { page: here, title: form.dataset.title || document.title, at: Date.now(), values: read(form) };
    try {
      localStorage.setItem(PREFIX + form.elements.form_id.value, JSON.stringify(draft));
    } catch { /* storage is full or forbidden: the form works without it */ }
  };

  const draftKeeping = (form) => {
    let timer = 0;
    const soon = () => { clearTimeout(timer); timer = setTimeout(() => keep(form), 300); };
    if (form.hasAttribute("data-bound")) keep(form);
    else restore(form);
    form.addEventListener("input", soon);
    form.addEventListener("change", soon);
    addEventListener("pagehide", () => { if (timer) { clearTimeout(timer); keep(form); } });
  };

  // The page between a form and its act carries what was typed along; its draft is the form's.
  const keepsDraft = (form) => form.elements.form_id && !form.hasAttribute("data-confirms");

  const answers = () => fetch(script.src, { method: "HEAD", cache: "no-store", signal: AbortSignal.timeout(10000) });

  const sendOnce = (form) => {
    const rest = () => { delete form.dataset.sending; form.removeAttribute("aria-busy"); };
    form.addEventListener("submit", async (event) => {
      if (form.dataset.sending === "now") { form.dataset.sending = "sent"; return; }
      event.preventDefault();
      if (form.dataset.sending) return; // the second tap
      form.dataset.sending = "asking";
      form.setAttribute("aria-busy", "true");
      if (keepsDraft(form)) keep(form);
      try {
        await answers();
        form.dataset.sending = "now";
        form.requestSubmit(event.submitter);
      } catch {
        rest();
        notice(form, "offline", words.offline);
      }
    });
    addEventListener("pageshow", (event) => { if (event.persisted) rest(); });
  };

  const listUnfinished = (section) => {
    for (const draft of drafts().filter((one) => one.page).sort((one, other) => other.at - one.at)) {
      const link = document.createElement("a");
      link.href = draft.page;
      link.textContent = `${draft.title} · ${new Date(draft.at).toLocaleString()}`;
      const line = document.createElement("li");
      line.append(link);
      section.querySelector("ul").append(line);
      section.hidden = false;
    }
  };

  forgetSaved();
  document.querySelectorAll("form[data-once]").forEach((form) => {
    sendOnce(form);
    // Rows are added by Django's script, whose buttons stand a moment after the page has loaded.
    if (keepsDraft(form)) addEventListener("load", () => setTimeout(draftKeeping, 50, form));
  });
  const section = document.getElementById("unfinished");
  if (section) listUnfinished(section);
})();
