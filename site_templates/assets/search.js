/* Search over pages, loops, sections, rules and parts. The index is scripts of its own, loaded when search is first opened. */
(() => {
  "use strict";
  const { make, tools, root, counted } = window.dossier;
  const MOST = 12;
  const index = { pages: [], sets: [], loops: [], rules: [], parts: [] };
  let files = 1, loaded = 0, asked = false, shared = "";

  const field = make("input", { type: "search", id: "search-words", autocomplete: "off", spellcheck: "false" });
  const status = make("p", { role: "status", class: "quiet" });
  const found = make("div", { class: "found" });
  const dialog = make(
    "dialog", { class: "search", "aria-label": "Search the dossier" },
    make("form", { method: "dialog" }, make("label", { for: "search-words" }, "Search "), field, make("button", { type: "submit" }, "Close")),
    status, found,
  );

  /* Called by each part of the index as it arrives. */
  window.dossierIndex = (part) => {
    files = part.files || files;
    shared = part.shared || shared;
    for (const [name, rows] of Object.entries(part.rows)) index[name] = index[name].concat(rows);
    loaded += 1;
    if (part.files) for (let number = 1; number < files; number += 1) load(number);
    if (loaded === 1 || loaded === files) show();
  };
  const load = (number) => {
    const failed = () => { status.textContent = "The index of this dossier could not be read."; };
    document.head.append(make("script", { src: `${root}assets/search-${number}.js`, error: failed }));
  };

  /* 0: no match; the more the better: whole text, its beginning, the beginning of a word, anywhere. */
  const worth = (text, word) => {
    const at = text.indexOf(word);
    if (at < 0) return 0;
    if (text === word) return 8;
    if (at === 0) return 5;
    return /[\s=.-]/.test(text[at - 1]) ? 3 : 1;
  };
  const rank = (name, other, words) => {
    let sum = 0;
    for (const word of words) {
      const best = Math.max(3 * worth(name, word), worth(other, word));
      if (!best) return 0;
      sum += best;
    }
    return sum;
  };
  const lower = (rows, name, other) =>
    rows.lowered || (rows.lowered = rows.map((row) => [name(row).toLowerCase(), other(row).toLowerCase()]));
  const best = (rows, name, other, words) => {
    const texts = lower(rows, name, other), hits = [];
    for (let at = 0; at < rows.length; at += 1) {
      const value = rank(texts[at][0], texts[at][1], words);
      if (value) hits.push({ row: rows[at], value, at });
    }
    return hits.sort((a, b) => b.value - a.value || a.at - b.at);
  };
  const sheet = (tag, anchor) => `${root}loops/${encodeURIComponent(tag)}.html${anchor ? `#${encodeURIComponent(anchor)}` : ""}`;

  /* A section is asked for by its title and by the loop's tag or service: "101 firm". */
  const sections = (words) => {
    const hits = [];
    index.loops.forEach((loop, at) => {
      const [tag, service] = lower(index.loops, (row) => row[0], (row) => row.slice(1, 5).join(" "))[at];
      const left = words.filter((word) => !rank(tag, service, [word]));
      if (left.length === words.length || left.length === 0) return;
      for (const [anchor, title] of index.sets[loop[5]]) {
        if (left.every((word) => title.toLowerCase().includes(word))) hits.push({ row: [loop[0], anchor, title, loop[1]] });
      }
    });
    return hits;
  };
  const line = (href, name, text) => make("li", {}, make("a", { href }, name), text ? ` ${text}` : "");
  const group = (title, hits, draw) => {
    if (!hits.length) return;
    const more = hits.length > MOST ? [make("p", { class: "quiet" }, `and ${hits.length - MOST} more`)] : [];
    found.append(make("h2", {}, title), make("ul", {}, ...hits.slice(0, MOST).map((hit) => draw(hit.row))), ...more);
  };
  const show = () => {
    const words = field.value.toLowerCase().split(/\s+/).filter(Boolean);
    found.textContent = "";
    if (!words.length) {
      status.textContent = loaded < files ? "Reading the index" : "A tag, a word of the service, a section with a tag, a rule, a part, a designation";
      return;
    }
    const loops = best(index.loops, (row) => row[0], (row) => row.slice(1, 5).join(" "), words);
    const pages = best(index.pages, (row) => row[1], (row) => row[2], words);
    const rules = best(index.rules, (row) => row[0], (row) => row.slice(1).join(" "), words);
    const parts = best(index.parts, (row) => row[0], (row) => row[1], words);
    const places = sections(words);
    group("Loops", loops, (row) => line(sheet(row[0]), row[0], `${row[1]}, ${row[3]}; ${row[4]}`));
    group("Sections", places, (row) => line(sheet(row[0], row[1]), `${row[0]} ${row[2]}`, row[3]));
    group("Pages", pages, (row) => line(root + row[0], row[1], row[2]));
    group("Rules", rules, (row) => line(`${root}rule-book.html#${encodeURIComponent(row[0])}`, row[0], row[1]));
    group("Parts", parts, (row) => line(row[2] ? sheet(row[2], "hardware") : `${root}${shared || "index.html"}`, row[0], row[1]));
    const all = loops.length + places.length + pages.length + rules.length + parts.length;
    status.textContent = (all ? counted(all, "place") : "Nothing found") + (loaded < files ? ", the index is still being read" : "");
  };

  const open = () => {
    if (!asked) { asked = true; load(0); }
    if (!dialog.open) dialog.showModal();
    field.focus();
    field.select();
    show();
  };
  const step = (event) => {
    const links = [...found.querySelectorAll("a")];
    const at = links.indexOf(document.activeElement);
    if (event.key === "Enter" && document.activeElement === field) {
      event.preventDefault();
      if (links.length) links[0].click();
    } else if ((event.key === "ArrowDown" || event.key === "ArrowUp") && links.length) {
      event.preventDefault();
      const next = at + (event.key === "ArrowDown" ? 1 : -1);
      if (next < 0) field.focus();
      else links[Math.min(next, links.length - 1)].focus();
    }
  };
  field.addEventListener("input", show);
  dialog.addEventListener("keydown", step);
  found.addEventListener("click", (event) => { if (event.target.closest("a")) dialog.close(); });
  document.body.append(dialog);
  tools.append(make("button", { type: "button", class: "tool", "aria-keyshortcuts": "/", click: open }, "Search"));
  document.addEventListener("keydown", (event) => {
    const typing = event.target.closest("input, textarea, select, dialog");
    if (event.key !== "/" || typing || event.ctrlKey || event.metaKey || event.altKey) return;
    event.preventDefault();
    open();
  });
})();
