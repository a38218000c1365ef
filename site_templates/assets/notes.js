/* Review notes on any row and as-left values of site checks: kept in this browser until they are exported as one file.
   Each entry has a key of its own in the storage, so that two open sheets never overwrite each other's. */
(() => {
  "use strict";
  const { make, tools, panel, revision, tag, page, counted } = window.dossier;
  const FORMAT = "specgen-notes/1";
  const OURS = `${FORMAT}|${JSON.stringify([panel, revision]).slice(0, -1)},`;
  const AUTHOR = "specgen-author";
  const STATES = ["open", "answered", "closed"];

  /* A browser may refuse to keep anything; then entries last as long as the page, and the page says so. */
  const kept = (() => {
    try {
      localStorage.setItem(`${FORMAT}?`, "");
      localStorage.removeItem(`${FORMAT}?`);
      return localStorage;
    } catch {
      const memory = new Map();
      return {
        lost: true,
        getItem: (key) => memory.get(key) ?? null,
        setItem: (key, value) => memory.set(key, value),
        removeItem: (key) => memory.delete(key),
        key: (at) => [...memory.keys()][at],
        get length() { return memory.size; },
      };
    }
  })();
  const keyOf = (kind, place, row) => `${OURS}${JSON.stringify([kind, place, row]).slice(1)}`;
  const get = (key) => {
    try {
      return JSON.parse(kept.getItem(key));
    } catch {
      return null;
    }
  };
  const put = (key, entry) => {
    try {
      if (entry) kept.setItem(key, JSON.stringify({ ...entry, written: new Date().toISOString(), exported: false }));
      else kept.removeItem(key);
    } catch {
      trouble.textContent = "This browser's storage is full: export, then write on.";
    }
    tell();
  };
  const every = () => {
    const found = [];
    for (let at = 0; at < kept.length; at += 1) {
      const key = kept.key(at);
      const entry = key.startsWith(OURS) ? get(key) : null;
      if (entry) found.push({ key, kind: JSON.parse(`[${key.slice(OURS.length)}`)[0], entry });
    }
    return found.sort((a, b) => (a.key < b.key ? -1 : 1));
  };

  /* What a row is called: its own id, else its section and first words; the same from revision to revision. */
  const said = (row) => {
    const first = row.matches("tr") ? row.cells[0] : row.querySelector(".label") || row.querySelector("b") || row;
    let text = "";
    for (const part of first.childNodes) {
      if (part.nodeType !== Node.ELEMENT_NODE || !part.matches(".aside, button, form, .note")) text += part.textContent;
    }
    return text.replace(/\s+/g, " ").trim().slice(0, 120);
  };
  const names = new Map(), taken = new Map();
  const nameOf = (row) => {
    if (row.id) return row.id;
    const section = row.closest("section");
    const slug = said(row).toLowerCase().replace(/[^\p{L}\p{N}.]+/gu, "-").slice(0, 60);
    const name = `${section ? section.getAttribute("aria-labelledby") : "top"}/${slug}`;
    const count = (taken.get(name) || 0) + 1;
    taken.set(name, count);
    return count === 1 ? name : `${name}~${count}`;
  };
  const rows = [...document.querySelectorAll("main section tbody tr:not(.group), main section .grounds > li, main section .plain > li, main section .f")];
  for (const row of rows) names.set(row, nameOf(row));

  /* As-left fields: a check has one entry wherever it is shown. A page of very many checks gets its fields as they come near. */
  const MOST_AT_ONCE = 4000;
  const fields = [];
  const keyOfCheck = (row) => keyOf("left", "", row.id);
  const equip = (row) => {
    if (row.equipped) return;
    row.equipped = true;
    const key = keyOfCheck(row), about = said(row);
    for (const cell of row.querySelectorAll("[data-entry]")) {
      const what = cell.dataset.entry;
      const field = make("input", { type: "text", "aria-label": `${what}: ${about}`, autocomplete: "off", maxlength: "200" });
      const change = () => {
        const entry = { tag: row.id.split(".")[0], row: row.id, about, ...get(key), [what]: field.value.trim() };
        put(key, entry.reading || entry.initials ? entry : null);
      };
      field.addEventListener("input", change);
      cell.append(field);
      fields.push({ field, key, what });
    }
  };
  const checks = rows.filter((row) => row.lastElementChild?.matches("[data-entry]"));
  if (checks.length * 2 <= MOST_AT_ONCE) checks.forEach(equip);
  else {
    const near = new IntersectionObserver((seen) => {
      for (const one of seen) {
        if (!one.isIntersecting) continue;
        near.unobserve(one.target);
        equip(one.target);
      }
      show();
    }, { rootMargin: "1500px" });
    for (const row of checks) near.observe(row);
  }
  const fill = (entries) => {
    for (const entry of entries.values()) {
      const row = entry.row && !entry.page ? document.getElementById(entry.row) : null;
      if (row && row.querySelector("[data-entry]")) equip(row);
    }
    for (const { field, key, what } of fields) {
      const text = (entries.get(key) || {})[what] || "";
      if (document.activeElement !== field && field.value !== text) field.value = text;
    }
  };

  /* Notes: shown under their row; the buttons to write one appear when notes are switched on. */
  const homes = new Map();
  const home = (row) => {
    if (homes.has(row)) return homes.get(row);
    const box = make("div", { class: "note" });
    if (row.matches("tr")) row.after(make("tr", { class: "noted" }, make("td", { colspan: String(row.cells.length) }, box)));
    else if (row.matches("li")) row.append(box);
    else row.after(box);
    homes.set(row, box);
    return box;
  };
  const clear = (row) => {
    const box = homes.get(row);
    if (!box) return;
    (box.closest(".noted") || box).remove();
    homes.delete(row);
  };
  const keyFor = (row) => keyOf("note", page, names.get(row));
  const draw = (row) => {
    const entry = get(keyFor(row));
    if (!entry) return clear(row);
    const box = home(row), day = entry.written.slice(0, 10);
    box.textContent = "";
    const head = ` ${[entry.author, day].filter(Boolean).join(", ")}${entry.exported ? "" : ", not exported"}: `;
    const change = make("button", { type: "button", "aria-label": `Edit the note on ${said(row)}`, click: () => edit(row) }, "Edit");
    box.append(make("p", {}, make("b", {}, `Note, ${entry.state}`), head, entry.text, " ", change));
    return box;
  };
  const edit = (row) => {
    const key = keyFor(row), entry = get(key), box = home(row);
    const id = `note-${rows.indexOf(row)}`;
    const text = make("textarea", { id, rows: "3", maxlength: "4000" });
    const author = make("input", { id: `${id}-by`, type: "text", autocomplete: "name", maxlength: "100" });
    const state = make("select", { id: `${id}-state` }, ...STATES.map((name) => make("option", { value: name }, name)));
    text.value = entry ? entry.text : "";
    author.value = entry ? entry.author : kept.getItem(AUTHOR) || "";
    state.value = entry ? entry.state : STATES[0];
    const leave = () => {
      draw(row);
      const back = (homes.get(row) || row).querySelector("button");
      if (back) back.focus();
    };
    const save = (event) => {
      event.preventDefault();
      const words = text.value.trim();
      try { kept.setItem(AUTHOR, author.value.trim()); } catch { /* the note itself will say so */ }
      put(key, words && { tag, page, row: names.get(row), about: said(row), author: author.value.trim(), text: words, state: state.value });
      leave();
    };
    const form = make(
      "form", { submit: save, keydown: (event) => { if (event.key === "Escape") leave(); } },
      make("label", { for: id }, `Note on ${said(row)}`), text,
      make("label", { for: `${id}-by` }, "By "), author, make("label", { for: `${id}-state` }, " State "), state,
      make("button", { type: "submit" }, "Keep"), make("button", { type: "button", click: leave }, "Leave"),
    );
    if (entry) form.append(make("button", { type: "button", click: () => { put(key, null); leave(); } }, "Remove"));
    box.textContent = "";
    box.append(form);
    text.focus();
  };
  const buttons = [];
  const offer = (on) => {
    for (const button of buttons.splice(0)) button.remove();
    if (!on) return;
    for (const row of rows) {
      const button = make("button", { type: "button", class: "add", "aria-label": `Note on ${said(row)}`, click: () => edit(row) }, "note");
      (row.matches("tr") ? row.cells[0] : row.matches(".f") ? row.querySelector("div") : row).append(button);
      buttons.push(button);
    }
  };

  /* One file for `specgen receive`. */
  const download = () => {
    const entries = every(), file = { format: FORMAT, panel, revision, exported: new Date().toISOString(), notes: [], as_left: [] };
    for (const { kind, entry } of entries) {
      const { exported, ...plain } = entry;
      (kind === "note" ? file.notes : file.as_left).push(plain);
    }
    const url = URL.createObjectURL(new Blob([`${JSON.stringify(file, null, 1)}\n`], { type: "application/json" }));
    const name = `notes-${panel}-${revision}-${file.exported.slice(0, 10)}.json`.replace(/[^\w.-]+/g, "_");
    const link = make("a", { href: url, download: name, hidden: true });
    document.body.append(link);
    link.click();
    link.remove();
    setTimeout(() => URL.revokeObjectURL(url), 60000);
    for (const { key, entry } of entries) kept.setItem(key, JSON.stringify({ ...entry, exported: true }));
    show();
  };
  const exporter = make("button", { type: "button", class: "tool", click: download });
  const toggle = make("button", { type: "button", class: "tool", "aria-pressed": "false" }, "Notes");
  toggle.addEventListener("click", () => {
    const on = toggle.getAttribute("aria-pressed") === "false";
    toggle.setAttribute("aria-pressed", String(on));
    offer(on);
  });
  const trouble = make("p", { class: "unexported", role: "status" });
  const mark = make("p", { class: "unexported", role: "status" });
  const tell = () => {
    const entries = every(), fresh = entries.filter((one) => !one.entry.exported);
    exporter.hidden = entries.length === 0;
    exporter.textContent = fresh.length ? `Export ${fresh.length} unexported` : "Export notes";
    const mine = fresh.filter(({ entry }) => (tag ? entry.tag === tag : entry.page ? entry.page === page : document.getElementById(entry.row)));
    const notes = mine.filter((one) => one.kind === "note").length, readings = mine.length - notes;
    const parts = [notes && counted(notes, "note"), readings && counted(readings, "reading")].filter(Boolean);
    const words = parts.length ? `Not exported yet from this page: ${parts.join(" and ")}.` : "";
    if (mark.textContent !== words) mark.textContent = words;
  };
  const show = () => {
    const entries = new Map(every().map(({ key, entry }) => [key, entry]));
    fill(entries);
    for (const row of rows) {
      const box = homes.get(row);
      if (box ? !box.querySelector("form") : entries.size && entries.has(keyFor(row))) draw(row);
    }
    tell();
  };
  if (rows.length) tools.append(toggle);
  tools.append(exporter);
  const heading = document.querySelector("main .kicker") || document.querySelector("main h1");
  if (heading) heading.after(mark, trouble);
  if (kept.lost) trouble.textContent = "This browser keeps nothing for this page: export notes before you close it.";
  window.addEventListener("storage", show);
  show();
})();
