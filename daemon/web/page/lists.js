// Alarms and findings.

import { el, refresh } from "./dom.js";
import { dayAndTime, number, unitText } from "./format.js";

const priorities = {
  1: "Danger: minutes", 2: "Protects the machine: within the hour", 3: "Costs energy: within days",
  4: "For diagnosis",
};

function unacknowledged(alarm) {
  return alarm.state === "active_unacknowledged" || alarm.state === "returned_unacknowledged";
}

function tone(alarm) {
  return alarm.priority === 1 ? "danger" : alarm.priority === 4 ? "plain" : "warn";
}

async function acknowledge(alarm, comment) {
  const reply = await fetch(`/api/v1/alarms/${encodeURIComponent(alarm.id)}/acknowledge`, {
    method: "POST",
    headers: { "Content-Type": "application/json" },
    body: JSON.stringify(comment ? { comment } : {}),
  });
  if (!reply.ok) {
    const problem = await reply.json().catch(() => ({}));
    throw new Error(problem.detail ?? "The monitor did not take it.");
  }
}

function acknowledgeForm(alarm, acknowledged) {
  const id = "ack-" + alarm.id;
  const comment = el("input", {
    id: id + "-comment", maxlength: "160", autocomplete: "off", name: "comment",
  });
  const button = el("button", { id, type: "submit" }, "Acknowledge");
  const said = el("p", { class: "failed", role: "alert" });
  const form = el("form", {}, el("label", {}, "Comment (may stay empty)", comment), button, said);
  form.addEventListener("submit", async (event) => {
    event.preventDefault();
    button.disabled = true;
    try {
      await acknowledge(alarm, comment.value.trim());
      comment.value = "";
      acknowledged();
    } catch (error) {
      said.textContent = error.message;
      button.disabled = false;
    }
  });
  return form;
}

function evidenceLine(item) {
  const unit = unitText(item.unit) ? " " + unitText(item.unit) : "";
  const digits = Number.isInteger(item.value) && !item.u ? 0 : 2;
  const half = item.u ? ` \u00b1 ${number(2 * item.u, digits)}${unit} (95 %)` : "";
  const limit = item.limit === null ? "" : `, limit ${number(item.limit, digits)}${unit}`;
  const source = item.document ? ` from ${item.document}` : "";
  return el("li", {}, `${item.text}: ${number(item.value, digits)}${unit}${half}${limit}${source}`);
}

const ofFindings = ["drift", "sensor-suspect"];

// The figures of a finding stand with it, in words; those of a limit stand here.
function behind(alarm) {
  if (ofFindings.includes(alarm.kind)) {
    return alarm.state.startsWith("active")
      ? el("p", {}, el("a", { href: `#finding-${alarm.id}` }, "What it rests on")) : null;
  }
  return alarm.evidence.length === 0 ? null
    : el("details", { id: "evidence-" + alarm.id }, el("summary", {}, "Figures behind it"),
      el("ul", {}, ...alarm.evidence.map(evidenceLine)));
}

function acknowledgedText(alarm) {
  const by = alarm.acknowledged_by ? ` by ${alarm.acknowledged_by}` : "";
  const comment = alarm.comment ? `: \u201c${alarm.comment}\u201d` : "";
  return `acknowledged ${dayAndTime(alarm.acknowledged)}${by}${comment}`;
}

function alarmItem(alarm, acknowledged) {
  const times = [`Since ${dayAndTime(alarm.since)}`];
  if (alarm.returned) {
    times.push(`over since ${dayAndTime(alarm.returned)}`);
  }
  if (alarm.acknowledged) {
    times.push(acknowledgedText(alarm));
  }
  return el("article", { class: "item", "data-tone": tone(alarm), "data-alarm": alarm.id },
    el("p", { class: "strong" }, alarm.text),
    el("p", {}, el("b", { class: "state" }, alarm.state_text), `. ${times.join(", ")}. `,
      `${priorities[alarm.priority]}.`, alarm.chattering ? " It comes and goes quickly." : ""),
    alarm.safety_relevant
      ? el("p", { class: "note" }, "This is information from a monitor, not a safety function.")
      : null,
    behind(alarm),
    unacknowledged(alarm) ? acknowledgeForm(alarm, acknowledged) : null);
}

export function showAlarms(place, alarms, acknowledged) {
  refresh(place, alarms, () => alarms.length === 0
    ? [el("p", { class: "note" }, "None.")]
    : alarms.map((alarm) => alarmItem(alarm, acknowledged)));
}

function lines(title, items) {
  return items.length === 0 ? []
    : [el("h4", {}, title), el("ul", {}, ...items.map((item) => el("li", {}, item)))];
}

function causes(finding) {
  if (finding.causes.length === 0) {
    return [];
  }
  const [first] = finding.causes;
  return [
    el("h4", {}, finding.cause_is_clear ? "What it most likely is" : "What it may be"),
    el("ol", {}, ...finding.causes.slice(0, 3).map((cause) =>
      el("li", {}, `${cause.text} (${number(100 * cause.probability, 0)} % of the causes compared)`))),
    el("p", {}, el("b", {}, "What would settle it: "), first.what_would_settle),
  ];
}

function findingItem(finding) {
  const watched = finding.state === "watch";
  return el("article", { class: "item", "data-tone": watched ? "plain" : "warn",
    "data-finding": finding.id, id: `finding-${finding.id}`, tabindex: "-1" },
    el("p", { class: "strong" }, finding.headline),
    ...finding.consequences.map((text) => el("p", {}, text)),
    ...causes(finding),
    ...lines("What it rests on", finding.evidence.map((e) => e.text)),
    el("h4", {}, "Keep in mind"),
    el("ul", { class: "cautions" }, ...finding.cautions.map((text) => el("li", {}, text))));
}

export function showFindings(place, findings) {
  refresh(place, findings, () => findings.length === 0
    ? [el("p", { class: "note" }, "No drift and no wrong sensor has been found.")]
    : findings.map(findingItem));
}
