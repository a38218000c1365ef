/* Plots: a line that reads the curves by pointer and arrow keys, and a slider that moves a trade-off's choice over the
   computed points. Both read the figure's own data (specgen/view/reading.py, trade_off_plot.py) and compute nothing new. */
(() => {
  "use strict";
  const { make, svg } = window.dossier;
  const STEPS = 200, LEAP = 20;

  const between = (value, low, high) => Math.min(Math.max(value, low), high);
  const valueAt = ([atLow, atHigh, low, high], place) => low + ((place - atLow) / (atHigh - atLow)) * (high - low);
  const written = (value, places, unit) => `${value.toFixed(places).replace(/^-/, "\u2212")}\u2009${unit}`;
  const inside = (axis, place) => place >= Math.min(axis[0], axis[1]) - 1 && place <= Math.max(axis[0], axis[1]) + 1;

  /* The pieces of a curve as drawn, M x y L x y ..., that lie in a panel. */
  const piecesOf = (plot, kind, panel) => {
    const pieces = [];
    for (const path of plot.querySelectorAll(`path.${kind}`)) {
      for (const piece of path.getAttribute("d").split("M").filter(Boolean)) {
        const flat = piece.split(/[L\s,]+/).filter(Boolean).map(Number);
        const points = [];
        for (let at = 0; at + 1 < flat.length; at += 2) points.push([flat[at], flat[at + 1]]);
        if (points.length > 1 && points.every((point) => inside(panel.y, point[1]))) pieces.push(points);
      }
    }
    return pieces;
  };
  const heightAt = (pieces, x) => {
    for (const points of pieces) {
      for (let at = 1; at < points.length; at += 1) {
        const [x0, y0] = points[at - 1], [x1, y1] = points[at];
        if (Math.min(x0, x1) <= x && x <= Math.max(x0, x1)) return x1 === x0 ? y1 : y0 + ((x - x0) / (x1 - x0)) * (y1 - y0);
      }
    }
    return NaN;
  };

  const readable = (figure, plot, readings) => {
    const panels = readings.map((panel) => ({
      ...panel, curves: panel.curves.map(([kind, name]) => ({ name, pieces: piecesOf(plot, kind, panel) })).filter((curve) => curve.pieces.length),
    }));
    const line = svg("path", { class: "readline" }), dots = svg("g", { class: "readdots" });
    const words = make("p", { class: "readout" }, "\u00a0");
    const glass = make("div", {
      class: "glass", tabindex: "0", role: "slider", "aria-label": "Reading line", "aria-valuemin": "0", "aria-valuemax": String(STEPS),
      "aria-valuenow": "0", "aria-valuetext": "arrow keys move it",
    });
    const frame = make("div", { class: "framed" });
    plot.before(frame);
    frame.append(plot, glass);
    frame.after(words);
    plot.append(line, dots);
    let step = 0, panel = panels[0];
    const read = (place) => {
      const [left, right] = panel.x, at = between(place, left, right);
      step = Math.round(((at - left) / (right - left)) * STEPS);
      dots.textContent = "";
      const parts = [];
      for (const curve of panel.curves) {
        const height = heightAt(curve.pieces, at);
        if (Number.isNaN(height)) continue;
        dots.append(svg("circle", { class: "readdot", r: "3", cx: at, cy: height }));
        parts.push(`${curve.name} ${written(valueAt(panel.y, height), panel.y_places, panel.y_unit)}`);
      }
      line.setAttribute("d", `M${at} ${Math.min(panel.y[0], panel.y[1])}V${Math.max(panel.y[0], panel.y[1])}`);
      const text = `At ${written(valueAt(panel.x, at), panel.x_places, panel.x_unit)}: ${parts.join(", ") || "no value"}`;
      words.textContent = text;
      glass.setAttribute("aria-valuenow", String(step));
      glass.setAttribute("aria-valuetext", text);
    };
    const go = (to) => read(panel.x[0] + (between(to, 0, STEPS) / STEPS) * (panel.x[1] - panel.x[0]));
    const point = (event) => {
      const box = plot.getBoundingClientRect(), view = plot.viewBox.baseVal;
      const height = ((event.clientY - box.top) / box.height) * view.height;
      panel = panels.find((one) => inside(one.y, height)) || panel;
      read(((event.clientX - box.left) / box.width) * view.width);
    };
    const moves = { ArrowRight: 1, ArrowUp: 1, ArrowLeft: -1, ArrowDown: -1, PageUp: LEAP, PageDown: -LEAP, Home: -STEPS, End: STEPS };
    glass.addEventListener("pointermove", point);
    glass.addEventListener("pointerdown", point);
    glass.addEventListener("focus", () => { if (glass.matches(":focus-visible")) go(step); });
    glass.addEventListener("keydown", (event) => {
      if (!(event.key in moves)) return;
      event.preventDefault();
      go(step + moves[event.key] * (event.shiftKey ? LEAP / 2 : 1));
    });
  };

  /* The readings are the ready texts of the computed points: the same as in the table below the plot. */
  const movable = (figure, plot, data) => {
    const { points, panels, chosen } = data;
    const line = svg("path", { class: "readline" }), dots = svg("g", { class: "readdots" });
    plot.append(line, dots);
    const id = `${figure.id}-choice`;
    const slider = make("input", { type: "range", id, min: "0", max: String(points.length - 1), step: "1" });
    slider.value = String(chosen);
    const said = make("output", { for: id, class: "said" });
    const show = () => {
      const at = Number(slider.value), point = points[at];
      line.setAttribute("d", `M${point.x} ${panels[0].top}V${panels[panels.length - 1].bottom}`);
      dots.textContent = "";
      for (const height of point.y) if (height !== null) dots.append(svg("circle", { class: "readdot", r: "3", cx: point.x, cy: height }));
      const stands = at === chosen ? "the choice" : point.within ? "within the rules" : "outside the rules";
      const text = `${Object.entries(point.said).map(([name, value]) => `${name} ${value}`).join(", ")}: ${stands}`;
      said.textContent = text;
      slider.setAttribute("aria-valuetext", text);
    };
    slider.addEventListener("input", show);
    figure.querySelector("figcaption").before(make("div", { class: "choice" }, make("label", { for: id }, `Another ${data.setting}`), slider, said));
    show();
  };

  for (const figure of document.querySelectorAll("figure[data-plot]")) {
    const plot = figure.querySelector("svg"), data = JSON.parse(figure.dataset.plot);
    if (data.readings) readable(figure, plot, data.readings);
    if (data.points && data.points.length > 1) movable(figure, plot, data);
  }
})();
