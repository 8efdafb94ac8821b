// Builds pieces of the page. Text always goes in as text, never as markup.

const svgSpace = "http://www.w3.org/2000/svg";

function fill(node, attributes, children) {
  for (const [name, value] of Object.entries(attributes)) {
    if (value === true) {
      node.setAttribute(name, "");
    } else if (value !== false && value !== null && value !== undefined) {
      node.setAttribute(name, value);
    }
  }
  node.append(...children.filter((child) => child !== null && child !== undefined));
  return node;
}

export function el(name, attributes = {}, ...children) {
  return fill(document.createElement(name), attributes, children);
}

export function svg(name, attributes = {}, ...children) {
  return fill(document.createElementNS(svgSpace, name), attributes, children);
}

const shown = new WeakMap();

// Builds the content of `place` anew where `source` differs from what it shows. What was typed,
// what was unfolded and where the focus is stays as it was.
export function refresh(place, source, build) {
  const key = JSON.stringify(source);
  if (shown.get(place) === key) {
    return;
  }
  shown.set(place, key);
  const typed = new Map();
  const open = new Set();
  for (const field of place.querySelectorAll("input[id]")) {
    typed.set(field.id, field.value);
  }
  for (const fold of place.querySelectorAll("details[open][id]")) {
    open.add(fold.id);
  }
  const focused = place.contains(document.activeElement) ? document.activeElement.id : "";
  place.replaceChildren(...build());
  for (const [id, value] of typed) {
    const field = document.getElementById(id);
    if (field) {
      field.value = value;
    }
  }
  for (const id of open) {
    const fold = document.getElementById(id);
    if (fold) {
      fold.open = true;
    }
  }
  if (focused) {
    (document.getElementById(focused) ?? place.closest("section"))?.focus();
  }
}

export function setText(node, text) {
  if (node.textContent !== text) {
    node.textContent = text;
  }
}
