// Everything works without this file. It adds: arrow keys between the rows of a table of typed figures,
// and one press only on forms that store something.
"use strict";

function cellInputs(table) {
  return Array.from(table.tBodies).flatMap((body) => Array.from(body.rows)).map((row) =>
    Array.from(row.querySelectorAll("input:not([type=hidden]):not([type=checkbox])")));
}

function moveFocus(event) {
  const step = { ArrowUp: -1, ArrowDown: 1 }[event.key];
  if (!step || event.altKey || event.ctrlKey || event.metaKey || event.target.tagName !== "INPUT") return;
  const rows = cellInputs(event.currentTarget).filter((inputs) => inputs.length > 0);
  const row = rows.findIndex((inputs) => inputs.includes(event.target));
  if (row < 0) return;
  const column = rows[row].indexOf(event.target);
  const next = rows[row + step];
  if (!next) return;
  event.preventDefault();
  const target = next[Math.min(column, next.length - 1)];
  target.focus();
  target.select();
}

document.querySelectorAll("table[data-arrows]").forEach((table) => table.addEventListener("keydown", moveFocus));

document.querySelectorAll("form[data-once]").forEach((form) =>
  form.addEventListener("submit", (event) => {
    if (form.dataset.sent) event.preventDefault();
    form.dataset.sent = "yes";
  }));

window.addEventListener("pageshow", () => document.querySelectorAll("form[data-once]").forEach((form) => delete form.dataset.sent));

const summary = document.querySelector("[data-focus]");
if (summary) summary.focus();
