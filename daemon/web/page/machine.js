// The section of one machine.

import { Chart, expectedPower, percentOf } from "./charts.js";
import { el, refresh, setText } from "./dom.js";
import { asPercent, dayAndTime, figure, interval, number } from "./format.js";
import { showLedger } from "./ledger.js";
import { showAlarms, showFindings } from "./lists.js";
import { toneOf } from "./signs.js";

function fold(id, title) {
  const tail = el("span", { class: "tail" });
  const body = el("div", { class: "fold-body" });
  return {
    tail, body,
    node: el("details", { class: "fold", id }, el("summary", {}, el("h3", {}, title), tail), body),
  };
}

function sheet(title, ...content) {
  return el("div", { class: "sheet" }, el("h3", {}, title), ...content);
}

function facts(machine, assessment) {
  const items = [
    [machine.read ? machine.mode_text : "not read", assessment.steady ? ", steady" : ""],
    [machine.duty, ""], [machine.refrigerant, ""],
    [machine.level, ": the sensors tell " + machine.level_text],
  ];
  if (machine.run_hours !== null) {
    items.push([number(machine.run_hours, 0) + " h", " run"]);
  }
  if (machine.starts !== null) {
    items.push([number(machine.starts, 0), " starts"]);
  }
  return items.map(([strong, rest]) => el("li", {}, el("b", {}, strong), rest));
}

// "Learned, in a narrow range of load or weather."
function learningText({ learned, text }) {
  return learned ? text[0].toUpperCase() + text.slice(1) + "." : `Still learning: ${text}.`;
}

// Expected against measured power, in words and figures.
function compare(machine, values) {
  const { power_kW: power, power_expected_kW: expected, power_residual_percent: more } = values;
  const row = (name, content, unit) => el("tr", {}, el("th", { scope: "row" }, name),
    el("td", { class: "figure" }, figure(content, unit)));
  return [
    el("table", { class: "compare" }, el("tbody", {}, row("Measured", power, "kW"),
      row("Expected when well", expected, "kW"), row("More than expected", more, "%"))),
    el("p", { class: "note" }, "Of this moment. What a fault costs changes with the load; what has "
      + "been found is the mean of many days, like for like."),
    machine.learning.text
      ? el("p", { class: "note" }, learningText(machine.learning))
      : null,
  ].filter((node) => node !== null);
}

function big(percent) {
  if (percent.reason) {
    return el("p", {}, figure(percent));
  }
  return el("p", { class: "big" }, el("data", { value: percent.value },
    number(percent.value, percent.decimals) + "\u00a0%"),
  el("span", { class: "interval" }, `${interval(percent)}\u00a0% (95\u00a0%)`));
}

function efficiency(values) {
  return [
    big(asPercent(values.second_law_efficiency)),
    el("p", { class: "note" }, "of the power is what the work needs at the least (second-law " +
      "efficiency)"),
  ];
}

function pointRow(point) {
  const good = point.quality === "good" || point.quality === "substituted";
  return el("tr", { "data-point": point.id },
    el("th", { scope: "row" }, point.name, el("br"), el("span", { class: "interval" }, point.id)),
    el("td", { class: "figure" }, good ? figure(point, point.unit)
      : el("span", { class: "missing" }, "no reading")),
    el("td", { class: good ? "figure" : "figure bad" }, point.quality_text));
}

function sensors(machine) {
  const bad = (p) => p.quality !== "good";
  const sorted = [...machine.points].sort((a, b) => bad(b) - bad(a));
  return [el("table", {},
    el("thead", {}, el("tr", {}, el("th", { scope: "col" }, "Sensor"),
      el("th", { scope: "col", class: "figure" }, "Reading"),
      el("th", { scope: "col", class: "figure" }, "State"))),
    el("tbody", {}, ...sorted.map(pointRow)))];
}

function ruleRow(rule) {
  return el("tr", { "data-rule": rule.kind },
    el("th", { scope: "row" }, rule.name, el("br"), el("span", { class: "interval" }, rule.text)),
    el("td", {}, rule.configured
      ? `${rule.setting}, from ${rule.document} (${rule.jurisdiction})`
      : el("b", {}, "not configured")));
}

function rules(machine) {
  return [
    el("p", { class: "note" }, "A rule works only with the set point that the owner entered from the " +
      "machine's documents and the local code. None is built in. These are messages of a monitor; " +
      "the machine's safety devices remain the protection."),
    el("table", {}, el("thead", {}, el("tr", {}, el("th", { scope: "col" }, "Rule"),
      el("th", { scope: "col" }, "Set point"))),
    el("tbody", {}, ...machine.safety_rules.map(ruleRow))),
  ];
}

function allFigures(assessment, quantities) {
  return [el("table", {},
    el("thead", {}, el("tr", {}, el("th", { scope: "col" }, "Figure"),
      el("th", { scope: "col", class: "figure" }, "Value"))),
    el("tbody", {}, ...quantities.map((q) => el("tr", {},
      el("th", { scope: "row" }, q.meaning, el("br"), el("span", { class: "interval" }, q.name)),
      el("td", { class: "figure" }, figure(assessment.quantities[q.name], q.unit))))))];
}

const charts = {
  efficiency: {
    quantities: ["second_law_efficiency"], columns: (share) => [percentOf(share)],
    labels: ["efficiency"], unit: "%", decimals: 1,
  },
  power: {
    quantities: ["power_kW", "power_residual_percent"],
    columns: (power, residual) => [power, expectedPower(power, residual)],
    labels: ["measured", "expected"], unit: "kW", decimals: 1,
  },
};

export class MachineSection {
  constructor(id, acknowledged) {
    this.id = id;
    this.acknowledged = acknowledged;
    this.title = el("h2", { id: `title-${id}` });
    this.lead = el("p", { class: "lead" });
    this.facts = el("ul", { class: "facts" });
    this.alarms = el("div", { class: "alarms" });
    this.findings = el("div");
    this.ledger = el("div", { class: "stair" });
    this.efficiency = el("div");
    this.compare = el("div");
    this.sensors = fold(`sensors-${id}`, "Sensors");
    this.rules = fold(`rules-${id}`, "Safety rules");
    this.figures = fold(`figures-${id}`, "All figures");
    this.charts = Object.entries(charts).flatMap(([name, what]) =>
      ["day", "season"].map((span) => [name, new Chart(id, span, what)]));
    this.visible = false;
    this.node = this.build();
    new IntersectionObserver((entries) => {
      this.visible = entries.some((entry) => entry.isIntersecting);
      this.drawCharts();
    }, { rootMargin: "300px" }).observe(this.node);
  }

  chartPair(name) {
    return el("div", { class: "two" },
      ...this.charts.filter(([of]) => of === name).map(([, chart]) => chart.node));
  }

  build() {
    return el("section", { class: "machine", id: `machine-${this.id}`, tabindex: "-1",
      "aria-labelledby": `title-${this.id}` },
    el("header", {}, this.title, this.lead, this.facts),
    el("div", { class: "now" },
      sheet("Alarms", this.alarms),
      sheet("Where the power goes now", this.ledger),
      sheet("How good it is now", this.efficiency),
      sheet("Expected against measured power", this.compare)),
    sheet("What has been found", this.findings),
    sheet("Second-law efficiency", el("ul", { class: "keys" },
      el("li", {}, el("span", { class: "key-line" }), "efficiency"),
      el("li", {}, el("span", { class: "key-band" }), "95 % interval")),
    this.chartPair("efficiency")),
    sheet("Power over time", el("ul", { class: "keys" },
      el("li", {}, el("span", { class: "key-line" }), "measured"),
      el("li", {}, el("span", { class: "key-line dashed" }), "expected when well")),
    this.chartPair("power"),
    el("p", { class: "note" }, "Gaps in the dashed line are hours outside what was learned. The " +
      "95 % intervals, often narrower than the lines, are in the tables.")),
    this.sensors.node, this.rules.node, this.figures.node);
  }

  update({ machine, assessment, alarms, findings, quantities, now }) {
    this.now = now;
    this.node.dataset.tone = toneOf(machine.condition);
    setText(this.title, machine.name);
    setText(this.lead, machine.sentence + ".");
    refresh(this.facts, [machine, assessment.steady], () => facts(machine, assessment));
    showAlarms(this.alarms, alarms, this.acknowledged);
    showFindings(this.findings, findings);
    showLedger(this.ledger, assessment.ledger);
    const values = assessment.quantities;
    refresh(this.efficiency, values.second_law_efficiency, () => efficiency(values));
    refresh(this.compare, [values, machine.learning], () => compare(machine, values));
    refresh(this.sensors.body, machine.points, () => sensors(machine));
    const bad = machine.points.filter((p) => p.quality !== "good").length;
    setText(this.sensors.tail, bad === 0 ? `all ${machine.points.length} good`
      : `${bad} of ${machine.points.length} not good`);
    refresh(this.rules.body, machine.safety_rules, () => rules(machine));
    const unset = machine.safety_rules.filter((rule) => !rule.configured).length;
    setText(this.rules.tail, unset === 0 ? "all configured" : `${unset} not configured`);
    refresh(this.figures.body, assessment.quantities, () => allFigures(assessment, quantities));
    setText(this.figures.tail, "of " + dayAndTime(assessment.time));
    this.drawCharts();
  }

  drawCharts(force = false) {
    if (!this.visible || !this.now || document.hidden) {
      return;
    }
    for (const [, chart] of this.charts) {
      chart.update(this.now, force);
    }
  }

  recolor() {
    for (const [, chart] of this.charts) {
      chart.recolor();
    }
  }
}
