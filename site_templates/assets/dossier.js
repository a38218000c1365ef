/* What a page's small modules share: where the page stands, how elements are made, room in the head for buttons.
   Classic scripts, since modules do not load from a disk. Nothing here is needed to read the page. */
(() => {
  "use strict";
  const { root = "", panel = "", revision = "", tag = "", page = "" } = document.body.dataset;

  /* Text becomes text nodes only: nothing a user wrote is ever parsed as markup. */
  const make = (name, attributes = {}, ...inside) => {
    const made = document.createElement(name);
    for (const [key, value] of Object.entries(attributes)) {
      if (typeof value === "function") made.addEventListener(key, value);
      else if (value === true) made.setAttribute(key, "");
      else if (value !== false && value !== undefined) made.setAttribute(key, value);
    }
    made.append(...inside);
    return made;
  };
  const svg = (name, attributes) => {
    const made = document.createElementNS("http://www.w3.org/2000/svg", name);
    for (const [key, value] of Object.entries(attributes)) made.setAttribute(key, value);
    return made;
  };
  const tools = make("div", { class: "tools", role: "group", "aria-label": "Work on the dossier" });
  const head = document.querySelector(".run");
  if (head) head.append(tools);
  const counted = (number, word) => `${number} ${word}${number === 1 ? "" : "s"}`;
  window.dossier = { root, panel, revision, tag, page, make, svg, tools, counted };
})();
