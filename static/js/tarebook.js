// Everything works without this file. It adds: arrow keys between the rows of a table of typed figures,
// and one press only on forms that store something.
"use strict";

const TYPED_IN = "input:not([type=hidden]):not([type=checkbox])";

function moveFocus(event) {
  const step = { ArrowUp: -1, ArrowDown: 1 }[event.key];
  if (!step || event.altKey || event.ctrlKey || event.metaKey || event.target.tagName !== "INPUT") return;
  const cell = event.target.closest("td");
  // By column, not by count: a row may lack an input that its neighbour has.
  const column = Array.from(event.currentTarget.tBodies).flatMap((body) => Array.from(body.rows))
    .map((row) => row.cells[cell.cellIndex]?.querySelector(TYPED_IN)).filter(Boolean);
  const target = column[column.indexOf(event.target) + step];
  if (!target) return;
  event.preventDefault();
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
