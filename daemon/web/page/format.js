// Figures, units and times for people.

import { el } from "./dom.js";

const units = {
  degC: "\u00b0C", degF: "\u00b0F", kPa_abs: "kPa absolute", kPa_gauge: "kPa gauge",
  bar_abs: "bar absolute", bar_gauge: "bar gauge", psi_abs: "psi absolute", psi_gauge: "psi gauge",
  l_s: "l/s", m3_h: "m\u00b3/h", kg_s: "kg/s", "1": "",
};

export function unitText(unit) {
  return units[unit] ?? unit;
}

const formats = new Map();
export function number(value, decimals) {
  if (!formats.has(decimals)) {
    formats.set(decimals, new Intl.NumberFormat("en-GB", {
      minimumFractionDigits: decimals, maximumFractionDigits: decimals,
    }));
  }
  const text = formats.get(decimals).format(value).replace("-", "\u2212");
  return /[1-9]/.test(text) ? text : text.replace("\u2212", "");
}

// The half width of the 95 % interval: twice the standard uncertainty.
export function interval(figures) {
  return figures.u > 0 ? "\u00b1\u00a0" + number(2 * figures.u, figures.decimals) : "";
}

export function figureText(figures, unit) {
  const tail = unitText(unit) ? " " + unitText(unit) : "";
  const half = interval(figures);
  return number(figures.value, figures.decimals) + (half ? " " + half : "") + tail;
}

// What shows as nothing but noughts, interval and all, is a plain 0.
export function plainZero(content) {
  const least = 0.5e-6;  // half of the last digit that is ever shown
  return Math.abs(content.value) < least && 2 * content.u < least
    ? { ...content, u: 0, decimals: 0 } : content;
}

// A <data> element with the exact value, or the reason why there is none.
export function figure(content, unit = "") {
  if (content === null || content.reason) {
    return el("span", { class: "missing" }, content?.reason.text ?? "unknown");
  }
  const tail = unitText(unit) ? "\u00a0" + unitText(unit) : "";
  const shown = plainZero(content);
  return el("data", { value: content.value },
    number(shown.value, shown.decimals),
    el("span", { class: "interval" }, "\u00a0" + interval(shown)), tail);
}

// A ratio as per cent.
export function asPercent(content) {
  return content.reason ? content : {
    value: 100 * content.value, u: 100 * content.u, decimals: Math.max(0, content.decimals - 2),
  };
}

let zone = "UTC";
export function setZone(name) {
  try {
    new Intl.DateTimeFormat("en-GB", { timeZone: name });
    zone = name;
  } catch {
    zone = "UTC";
  }
}

function format(time, options) {
  return new Intl.DateTimeFormat("en-GB", { timeZone: zone, ...options }).format(new Date(time));
}

export const clockTime = (time) => format(time, { hour: "2-digit", minute: "2-digit" });
export const clockSeconds = (time) =>
  format(time, { hour: "2-digit", minute: "2-digit", second: "2-digit" });
export const day = (time) => format(time, { day: "numeric", month: "long" });
export const shortDay = (time) => format(time, { day: "numeric", month: "short" });
export const dayAndTime = (time) =>
  format(time, { day: "numeric", month: "long", hour: "2-digit", minute: "2-digit" });
export const plainMinutes = (time) =>
  format(time, { day: "numeric", month: "short", hour: "2-digit", minute: "2-digit" });
