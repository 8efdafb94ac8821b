// Trends with their 95 % bands, drawn by dygraphs (MIT licence, /licences/dygraphs.txt).

import { el } from "./dom.js";
import { clockTime, number, plainMinutes, shortDay } from "./format.js";

// Its own legend sets style attributes, which the content security policy forbids; ours stands above.
Dygraph.PLUGINS = Dygraph.PLUGINS.filter((plugin) => plugin !== Dygraph.Plugins.Legend);

const hour = 3600e3;
const spans = {
  day: { length: 24 * hour, points: 96, title: "last 24 hours", every: 15e3 },
  season: { length: 120 * 24 * hour, points: 120, title: "season (120 days)", every: 300e3 },
};

function color(name) {
  return getComputedStyle(document.documentElement).getPropertyValue(name).trim();
}

async function trend(machine, quantity, from, to, points) {
  const query = new URLSearchParams({
    quantity, points, from: new Date(from).toISOString(), to: new Date(to).toISOString(),
  });
  const reply = await fetch(`/api/v1/machines/${encodeURIComponent(machine)}/trend?${query}`);
  if (!reply.ok) {
    throw new Error((await reply.json()).detail);
  }
  return reply.json();
}

const none = [null, null];

// A share as per cent.
export function percentOf([value, u]) {
  return value === null ? none : [100 * value, 100 * u];
}

// Like for like: the residual is of those scans of an hour that could be compared, and applied to
// the mean of the whole hour, so that both lines speak of the same hours. The uncertainty is the
// residual's, for the measured power is the same in both.
export function expectedPower([power], [residual, u]) {
  if (power === null || residual === null || residual <= -100) {
    return none;
  }
  const ratio = 1 + residual / 100;
  return [power / ratio, ((power / ratio) * (u / 100)) / ratio];
}

// Rows of [time, [value, u], ...] for all times that any of the trends has; `columns` makes what is
// drawn of what was asked for.
function rowsOf(trends, columns) {
  const rows = new Map();
  trends.forEach((one, asked) => one.times.forEach((time, i) => {
    if (!rows.has(time)) {
      rows.set(time, trends.map(() => none));
    }
    if (one.values[i] !== null) {
      rows.get(time)[asked] = [one.values[i], one.u[i]];
    }
  }));
  return [...rows].map(([time, pairs]) => [new Date(time), ...columns(...pairs)])
    .sort((a, b) => a[0] - b[0]);
}

// One chart with its title, its reading under the pointer, and the same figures as a table.
export class Chart {
  // what: { quantities: [name], columns: (...[value, u]) => [[value, u]], labels: [text], unit,
  // decimals }
  constructor(machine, spanName, what) {
    this.machine = machine;
    this.span = spans[spanName];
    this.what = what;
    this.asked = 0;
    this.rows = [];
    this.canvas = el("div", { class: "chart", role: "img" });
    this.readout = el("p", { class: "readout", "aria-hidden": "true" });
    this.table = el("div", { class: "scroll", tabindex: "0", role: "region",
      "aria-label": `${what.labels.join(" and ")}, ${this.span.title}, as a table` });
    const fold = el("details", {}, el("summary", {}, "As a table"), this.table);
    fold.addEventListener("toggle", () => this.fillTable());
    this.fold = fold;
    this.node = el("div", { class: "chart-box" },
      el("p", { class: "chart-title" }, this.span.title), this.canvas, this.readout, fold);
  }

  // Asks for the trend anew where the shown one is old; now: the plant's time.
  async update(now, force = false) {
    if (!force && Date.now() - this.asked < this.span.every) {
      return;
    }
    this.asked = Date.now();
    const from = now - this.span.length;
    try {
      const trends = await Promise.all(this.what.quantities.map(
        (quantity) => trend(this.machine, quantity, from, now, this.span.points)));
      this.rows = rowsOf(trends, this.what.columns);
      this.draw([from, now]);
    } catch (error) {
      this.empty(error.message);
    }
  }

  empty(why) {
    this.graph?.destroy();
    this.graph = null;
    this.canvas.classList.add("chart-empty");
    this.canvas.textContent = why;
    this.canvas.removeAttribute("aria-label");
  }

  draw(window) {
    if (!this.rows.some((row) => row.slice(1).some(([value]) => value !== null))) {
      this.empty("No figures in this time yet.");
      return;
    }
    this.describe();
    this.fillTable();
    if (this.graph) {
      this.graph.updateOptions({ file: this.rows, dateWindow: window });
      return;
    }
    this.canvas.classList.remove("chart-empty");
    this.canvas.textContent = "";
    this.graph = new Dygraph(this.canvas, this.rows, this.options(window));
  }

  options(window) {
    const isDay = this.span === spans.day;
    const unit = this.what.unit;
    return {
      labels: ["time", ...this.what.labels],
      dateWindow: window,
      errorBars: true,
      sigma: 2,
      fillAlpha: 0.28,
      colors: [color("--needed"), color("--lost")],
      strokeWidth: 1.8,
      series: Object.fromEntries(this.what.labels.map((label, i) =>
        [label, i === 0 ? {} : { strokePattern: [7, 4] }])),
      legend: "never",
      labelsUTC: true,
      interactionModel: {},
      gridLineColor: color("--line"),
      axisLineColor: color("--line"),
      gridLineWidth: 1,
      highlightCircleSize: 3,
      rightGap: 8,
      axes: {
        x: {
          pixelsPerLabel: 70,
          axisLabelFormatter: (time) => (isDay ? clockTime(time) : shortDay(time)),
        },
        y: {
          axisLabelWidth: 58,
          pixelsPerLabel: 36,
          axisLabelFormatter: (value, granularity, options, graph) => {
            const [low, high] = graph.yAxisRange();
            return number(value, high - low < 5 ? 1 : 0) + "\u00a0" + unit;
          },
        },
      },
      highlightCallback: (event, x) => {
        const row = this.rows.find(([time]) => time.getTime() === x);
        this.readout.textContent = row ? this.sentence(row) : "";
      },
      unhighlightCallback: () => { this.readout.textContent = ""; },
    };
  }

  cell([value, u]) {
    return value === null ? "none"
      : `${number(value, this.what.decimals)} \u00b1 ${number(2 * u, this.what.decimals)} ` +
        this.what.unit;
  }

  sentence(row) {
    return `${plainMinutes(row[0])}: ` +
      this.what.labels.map((label, i) => `${label} ${this.cell(row[i + 1])}`).join(", ");
  }

  describe() {
    const last = this.rows.findLast((row) => row[1][0] !== null);
    this.canvas.setAttribute("aria-label", `Chart of ${this.what.labels.join(" and ")}, ` +
      `${this.span.title}.` + (last ? ` Last: ${this.sentence(last)}.` : ""));
  }

  fillTable() {
    if (!this.fold.open) {
      return;
    }
    const step = Math.max(1, Math.ceil(this.rows.length / 48));
    this.table.replaceChildren(el("table", {},
      el("caption", {}, "Means, with the half width of the 95 % interval."),
      el("thead", {}, el("tr", {}, el("th", { scope: "col" }, "From"),
        ...this.what.labels.map((label) => el("th", { scope: "col", class: "figure" }, label)))),
      el("tbody", {}, ...this.rows.filter((row, i) => i % step === 0).map((row) => el("tr", {},
        el("th", { scope: "row" }, plainMinutes(row[0])),
        ...row.slice(1).map((pair) => el("td", { class: "figure" }, this.cell(pair))))))));
  }

  // After the colours changed.
  recolor() {
    this.graph?.updateOptions({
      colors: [color("--needed"), color("--lost")], gridLineColor: color("--line"),
      axisLineColor: color("--line"),
    });
  }
}
