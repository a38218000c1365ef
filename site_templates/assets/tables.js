/* Tables: a column's head sorts, a field filters the rows of a page. Tables of site checks keep their order of work. */
(() => {
  "use strict";
  const { make, tag, counted } = window.dossier;
  const SORTED_FROM = 5, FILTERED_FROM = 8;
  const ORDER = ["held", "open", "deviates", "meets"];
  const FACTOR = { ms: 1e-3, s: 1, min: 60, h: 3600, day: 86400, days: 86400, year: 31557600, years: 31557600 };
  const PREFIX = { m: 1e-3, k: 1e3, M: 1e6 };
  const collator = new Intl.Collator("en", { numeric: true, sensitivity: "base" });

  /* A cell's number in a common unit, where its unit stands in the cell; without a number it goes last. */
  const numberOf = (text) => {
    const plain = text.replace(/\u2212/g, "-").replace(/[\u2009\u202f\u00a0](?=\d{3}(?!\d))/g, "");
    const found = plain.match(/(-?\d+(?:\.\d+)?(?:e[+-]?\d+)?)\s*([^\s,;]*)/);
    if (!found) return plain.includes("without limit") ? Infinity : NaN;
    const scaled = found[2].match(/^([mkM])[AVW\u03a9]$/);
    return Number(found[1]) * (FACTOR[found[2]] || (scaled ? PREFIX[scaled[1]] : 1));
  };
  const keyOf = (cell, numeric) => {
    const mark = cell && cell.querySelector(".mark");
    if (mark) return ORDER.indexOf(mark.textContent.trim());
    const text = cell ? cell.textContent.trim() : "";
    if (numeric) return numberOf(text);
    return text === "\u2013" ? "" : text;
  };
  const missing = (key) => key === "" || Number.isNaN(key);
  const compare = (a, b, way) => {
    if (missing(a) || missing(b)) return missing(a) - missing(b);
    return way * (typeof a === "number" && typeof b === "number" ? (a > b) - (a < b) : collator.compare(a, b));
  };

  /* A row with the note rows that follow it; a heading stands for the rows below it. */
  class Sheet {
    constructor(table) {
      this.body = table.tBodies[0];
      this.units = [];
      this.sorted = false;
      let heading = null;
      for (const row of this.body.rows) {
        if (row.classList.contains("group")) heading = row;
        else if (!row.classList.contains("noted")) this.units.push({ row, heading, text: "" });
      }
    }
    followers(row) {
      const found = [row];
      for (let next = row.nextElementSibling; next && next.classList.contains("noted"); next = next.nextElementSibling) found.push(next);
      return found;
    }
    arrange(units) {
      const placed = document.createDocumentFragment();
      let heading = null;
      for (const unit of units) {
        const rows = this.followers(unit.row);
        if (!this.sorted && unit.heading && unit.heading !== heading) placed.append(unit.heading);
        heading = unit.heading;
        placed.append(...rows);
      }
      if (this.sorted) for (const row of this.body.querySelectorAll(".group")) placed.append(row);
      this.body.append(placed);
      this.headings();
    }
    headings() {
      const used = new Set(this.units.filter((unit) => !unit.row.hidden).map((unit) => unit.heading));
      for (const row of this.body.querySelectorAll(".group")) row.hidden = this.sorted || !used.has(row);
    }
    sort(column, way, numeric) {
      this.sorted = way !== 0;
      if (!this.sorted) return this.arrange(this.units);
      const keyed = this.units.map((unit) => ({ unit, key: keyOf(unit.row.cells[column], numeric) }));
      keyed.sort((a, b) => compare(a.key, b.key, way));
      return this.arrange(keyed.map((one) => one.unit));
    }
    filter(words) {
      let shown = 0;
      for (const unit of this.units) {
        unit.text = unit.text || `${unit.heading ? unit.heading.textContent : ""} ${unit.row.textContent}`.toLowerCase();
        const hidden = !words.every((word) => unit.text.includes(word));
        for (const row of this.followers(unit.row)) row.hidden = hidden;
        shown += hidden ? 0 : 1;
      }
      this.headings();
      return shown;
    }
  }

  const sortable = (table, sheet) => {
    const heads = [...table.tHead.rows[0].cells];
    heads.forEach((head, column) => {
      if (!head.textContent.trim()) return;
      const button = make("button", { type: "button", class: "sort" });
      button.append(...head.childNodes);
      head.append(button);
      button.addEventListener("click", () => {
        const before = head.getAttribute("aria-sort");
        const way = before === "ascending" ? -1 : before === "descending" ? 0 : 1;
        for (const other of heads) other.removeAttribute("aria-sort");
        if (way) head.setAttribute("aria-sort", way > 0 ? "ascending" : "descending");
        sheet.sort(column, way, head.classList.contains("n"));
      });
    });
  };

  const sheets = [];
  for (const table of document.querySelectorAll("main table")) {
    if (!table.tHead || !table.tBodies.length) continue;
    const sheet = new Sheet(table);
    sheets.push({ table, sheet });
    if (sheet.units.length >= SORTED_FROM && !table.querySelector("[data-entry]")) sortable(table, sheet);
  }
  const total = sheets.reduce((sum, one) => sum + one.sheet.units.length, 0);
  const first = document.querySelector("main > section");
  if (tag || !first || total < FILTERED_FROM) return;

  const count = make("span", { role: "status" }, counted(total, "row"));
  const field = make("input", { type: "search", id: "filter", autocomplete: "off", spellcheck: "false" });
  const filter = () => {
    const words = field.value.toLowerCase().split(/\s+/).filter(Boolean);
    let shown = 0;
    for (const one of sheets) {
      one.shown = one.sheet.filter(words);
      shown += one.shown;
    }
    for (const section of document.querySelectorAll("main > section")) {
      const own = sheets.filter((one) => section.contains(one.table));
      section.hidden = words.length > 0 && own.length > 0 && own.every((one) => one.shown === 0);
    }
    count.textContent = words.length ? `${shown} of ${counted(total, "row")}` : counted(total, "row");
  };
  field.addEventListener("input", filter);
  field.addEventListener("keydown", (event) => {
    if (event.key === "Escape") { field.value = ""; filter(); }
  });
  first.before(make("div", { class: "filter" }, make("label", { for: "filter" }, "Rows with "), field, count));
})();
