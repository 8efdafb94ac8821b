// Asks the monitor, shows what it says, and says so when it says nothing.

import { el, refresh, setText } from "./dom.js";
import { asPercent, clockSeconds, day, figureText, setZone } from "./format.js";
import { listen } from "./live.js";
import { showAlarms } from "./lists.js";
import { MachineSection } from "./machine.js";
import { sign, toneOf } from "./signs.js";

const at = (id) => document.getElementById(id);
const sections = new Map();
let plant = null;
let quantities = [];
let isLive = false;

async function ask(path) {
  const reply = await fetch(path);
  if (!reply.ok) {
    throw new Error(`${path}: ${reply.status}`);
  }
  return reply.json();
}

function more(machine, assessment, alarms) {
  const parts = [];
  const power = assessment.quantities.power_kW;
  const share = assessment.quantities.second_law_efficiency;
  if (!power.reason && machine.mode !== "off") {
    parts.push(`takes ${figureText(power, "kW")}`);
  }
  if (!share.reason) {
    parts.push(`${figureText(asPercent(share), "%")} of it is needed at the least`);
  }
  const active = alarms.filter((alarm) => alarm.state.startsWith("active")).length;
  if (active > 0) {
    parts.push(active === 1 ? "1 active alarm" : `${active} active alarms`);
  }
  return parts.join(", ");
}

function glanceItem({ machine, assessment, alarms }) {
  const stale = isLive ? "" : "Last known: ";
  return el("li", {}, el("a", { href: `#machine-${machine.id}`, id: `glance-${machine.id}`,
    "data-tone": isLive ? toneOf(machine.condition) : "plain", "data-condition": machine.condition },
  sign(isLive ? machine.condition : "not_read"),
  el("span", { class: "said" }, `${stale}${machine.sentence}.`),
  el("span", { class: "word" }, isLive ? machine.condition_text : "not live"),
  el("span", { class: "more" }, more(machine, assessment, alarms))));
}

function section(id) {
  if (!sections.has(id)) {
    const made = new MachineSection(id, update);
    sections.set(id, made);
    at("machines").append(made.node);
  }
  return sections.get(id);
}

function show() {
  setZone(plant.timezone);
  setText(at("site"), plant.site);
  document.title = `${plant.site} - lostwork`;
  at("demonstration").hidden = !plant.demonstration;
  setText(at("version"), `lostwork ${plant.version}`);
  refresh(at("glance"), [plant.rows, isLive], () => plant.rows.map(glanceItem));
  at("plant-alarms").hidden = plant.alarms.length === 0;
  showAlarms(at("plant-alarm-list"), plant.alarms, update);
  for (const row of plant.rows) {
    section(row.machine.id).update({ ...row, quantities, now: Date.parse(plant.time) });
  }
  showLive();
}

function showLive() {
  const time = plant ? `${day(plant.time)}, ${clockSeconds(plant.time)}` : "";
  document.body.dataset.stale = isLive ? "no" : "yes";
  at("live").dataset.live = isLive ? "yes" : "no";
  // Spoken by a screen reader only when it changes its kind, not every second.
  at("live").setAttribute("aria-live", isLive ? "off" : "polite");
  setText(at("live"), isLive ? `Live, ${time}`
    : `Not live since ${time || "the page was opened"}. Trying again`);
}

async function load() {
  if (quantities.length === 0) {
    quantities = (await ask("/api/v1/quantities")).quantities;
  }
  const [about, alarms, findings] = await Promise.all(
    [ask("/api/v1/machines"), ask("/api/v1/alarms"), ask("/api/v1/findings")]);
  const rows = await Promise.all(about.machines.map(async (machine) => ({
    machine,
    assessment: await ask(`/api/v1/machines/${encodeURIComponent(machine.id)}/assessment`),
    alarms: alarms.alarms.filter((alarm) => alarm.machine === machine.id),
    findings: findings.findings.filter((finding) => finding.machine === machine.id),
  })));
  plant = { ...about, rows, alarms: alarms.alarms.filter((alarm) => alarm.machine === "") };
}

let loading = false;
let again = false;
// One question at a time; what comes meanwhile makes one more.
async function update() {
  if (loading) {
    again = true;
    return;
  }
  loading = true;
  do {
    again = false;
    try {
      await load();
      show();
    } catch {
      isLive = false;
      showLive();
    }
  } while (again);
  loading = false;
}

listen({
  changed: update,
  lost: () => {
    isLive = false;
    if (plant) {
      show();
    } else {
      showLive();
    }
  },
  back: () => {
    isLive = true;
    update();
  },
});

matchMedia("(prefers-color-scheme: dark)").addEventListener("change", () => {
  for (const made of sections.values()) {
    made.recolor();
  }
});
document.addEventListener("visibilitychange", () => {
  for (const made of sections.values()) {
    made.drawCharts();
  }
});
