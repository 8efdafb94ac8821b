// Where the power goes: a table whose bars are a stair from nothing to the input.

import { el, refresh, svg } from "./dom.js";
import { figure, number, plainZero } from "./format.js";

const bars = {
  needed: "bar-needed", lost: "bar-lost", casing: "bar-casing", unaccounted: "bar-unaccounted",
};

// The places of all bars on one scale, in per cent of the width.
function stair(rows, input) {
  let sum = 0;
  const steps = rows.map((row) => {
    const value = row.power_kW.value ?? 0;
    const step = { from: sum, to: sum + value, u: row.power_kW.u ?? 0 };
    sum += value;
    return step;
  });
  const ends = steps.flatMap((s) => [s.from, s.to - 2 * s.u, s.to + 2 * s.u]);
  const least = Math.min(0, ...ends);
  const most = Math.max(input, 0, ...ends);
  const scale = (value) => (100 * (value - least)) / (most - least || 1);
  return { steps, scale };
}

function bar(kind, step, scale) {
  const left = scale(Math.min(step.from, step.to));
  const right = scale(Math.max(step.from, step.to));
  const [low, high] = [scale(step.to - 2 * step.u), scale(step.to + 2 * step.u)];
  const line = (x1, x2, y1, y2) =>
    svg("line", { class: "bar-whisker", x1: x1 + "%", x2: x2 + "%", y1: y1 + "%", y2: y2 + "%" });
  return svg("svg", { "aria-hidden": "true", focusable: "false" },
    svg("line", { class: "bar-axis", x1: "0", x2: "100%", y1: "100%", y2: "100%" }),
    svg("rect", {
      class: kind, x: left + "%", width: Math.max(right - left, 0.4) + "%", y: "12%", height: "76%",
    }),
    ...(step.u > 0 ? [line(low, high, 50, 50), line(low, low, 25, 75), line(high, high, 25, 75)]
      : []));
}

// The most decimals that any figure of a column has: shorter ones are filled up with blanks.
function most(figures) {
  return Math.max(0, ...figures.filter((f) => f && f.decimals !== undefined)
    .map((f) => plainZero(f).decimals));
}

// A figure whose decimal point stands under the one above it.
function aligned(content, decimals) {
  const node = figure(content);
  if (node.localName === "data") {
    const own = plainZero(content).decimals;
    const missing = decimals - own + (own === 0 && decimals > 0 ? 1 : 0);
    node.firstChild.after("\u2007".repeat(missing));
  }
  return node;
}

function tableRow(row, step, scale, decimals) {
  const power = row.power_kW;
  return el("tr", { "data-quantity": row.quantity, "data-part": row.part },
    el("th", { scope: "row" },
      el("span", { class: "name" }, row.text), power.reason ? null : bar(bars[row.part], step, scale),
      row.note ? el("span", { class: "remark" }, row.note) : null),
    el("td", { class: "figure" }, aligned(power, decimals.power)),
    el("td", { class: "figure" }, row.percent ? aligned(row.percent, decimals.percent) : ""));
}

function key(kind, text) {
  return el("li", {},
    svg("svg", { "aria-hidden": "true", focusable: "false" },
      svg("rect", { class: bars[kind], width: "100%", height: "100%" })), text);
}

function closing(ledger) {
  if (!ledger.complete) {
    return "The rows do not add up to the input, because a figure is missing.";
  }
  return ledger.split ? "The rows add up to the input."
    : "The rows add up to the input. What each part of the machine loses cannot be told with these " +
      "sensors: it takes pressures and temperatures of the refrigerant.";
}

function headline(ledger) {
  const [first] = ledger.rows;
  if (ledger.input.reason || first.power_kW.reason || !first.percent) {
    return "";
  }
  return number(ledger.input.value, ledger.input.decimals) + " kW go in. " +
    number(first.percent.value, 0) + " % of it is the least that any machine would need for this " +
    "work; the rest is lost on the way.";
}

function table(ledger) {
  const { steps, scale } = stair(ledger.rows, ledger.input.value ?? 0);
  const decimals = {
    power: most([...ledger.rows.map((row) => row.power_kW), ledger.input]),
    percent: most(ledger.rows.map((row) => row.percent)),
  };
  const input = ledger.input;
  return el("table", { class: "ledger" },
    el("caption", {}, "Each interval is \u00b1 and holds with 95 % confidence."),
    el("thead", {}, el("tr", {},
      el("th", { scope: "col" }, "Where it goes"),
      el("th", { scope: "col", class: "figure" }, "kW"),
      el("th", { scope: "col", class: "figure" }, "%"))),
    el("tbody", {}, ...ledger.rows.map((row, i) => tableRow(row, steps[i], scale, decimals))),
    el("tfoot", {}, el("tr", { "data-quantity": "power_kW" },
      el("th", { scope: "row" }, el("span", { class: "name" }, "Power into the machine"),
        input.reason ? null
          : bar("bar-input", { from: 0, to: input.value, u: input.u }, scale)),
      el("td", { class: "figure" }, aligned(input, decimals.power)),
      el("td", { class: "figure" }, input.reason ? ""
        : aligned({ value: 100, u: 0, decimals: 0 }, decimals.percent)))));
}

export function showLedger(place, ledger) {
  refresh(place, ledger, () => [
    el("p", {}, headline(ledger)),
    el("ul", { class: "keys" }, key("needed", "needed"), key("lost", "lost in the machine"),
      key("casing", "casing heat"), key("unaccounted", "sensors disagree")),
    table(ledger),
    el("p", { class: "note" }, closing(ledger)),
  ]);
}
