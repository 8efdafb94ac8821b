// A shape for each condition: no meaning rests on colour alone.

import { svg } from "./dom.js";

const circle = "M16 3a13 13 0 1 0 0 26 13 13 0 1 0 0-26z";
const triangle = "M16 4 30 28H2z";
const diamond = "M16 2 30 16 16 30 2 16z";
const octagon = "M10.5 3h11L29 10.5v11L21.5 29h-11L3 21.5v-11z";
const exclaim = "M16 12v8M16 24v.5";
const question = "M12.5 13a3.5 3.5 0 1 1 5 3c-1.2.7-1.5 1.3-1.5 2.6M16 22.5v.5";

const signs = {
  well: ["good", circle, "M10 16.5l4.2 4.2L22.5 12"],
  off: ["plain", circle, "M16 9.5v6.5"],
  watched: ["plain", circle, "M9 16c4-6 10-6 14 0-4 6-10 6-14 0M16 16v.1"],
  learning: ["plain", circle, "M10 16h.1M16 16h.1M22 16h.1"],
  too_few_sensors: ["plain", circle, "M10 16h12"],
  alarm: ["warn", triangle, exclaim],
  drifted: ["warn", triangle, "M16 25v-10M12 18.5l4-4 4 4"],
  sensor_failed: ["warn", diamond, question],
  sensor_suspect: ["warn", diamond, question],
  not_read: ["danger", octagon, "M11 11l10 10M21 11 11 21"],
  danger: ["danger", octagon, exclaim.replaceAll("M16 12v8", "M16 9v9").replace("24", "22.5")],
};

export function toneOf(condition) {
  return (signs[condition] ?? signs.not_read)[0];
}

export function sign(condition) {
  const [, frame, mark] = signs[condition] ?? signs.not_read;
  const line = { fill: "none", stroke: "currentColor", "stroke-width": "2.5",
    "stroke-linecap": "round", "stroke-linejoin": "round" };
  return svg("svg", { class: "sign", viewBox: "0 0 32 32", "aria-hidden": "true", focusable: "false" },
    svg("path", { ...line, d: frame }), svg("path", { ...line, d: mark }));
}
