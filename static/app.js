// What htmx doesn't do by itself: after a part of a page has been exchanged the
// focus goes to the heading of what is new, or to the list of faults; a note
// that was opened can be closed with Escape and gives the focus back.
(function () {
  "use strict";

  var opener = null;

  function focusOn(element) {
    if (!element) return;
    if (!element.hasAttribute("tabindex")) element.setAttribute("tabindex", "-1");
    element.focus({ preventScroll: false });
  }

  document.addEventListener("htmx:beforeRequest", function (event) {
    if (event.detail.elt.closest("a")) opener = event.detail.elt;
  });

  document.addEventListener("htmx:afterSwap", function (event) {
    var target = document.getElementById(event.detail.target.id) || event.detail.target;
    var cause = event.detail.requestConfig && event.detail.requestConfig.triggeringEvent;
    // The focus moves only when somebody asked for the change: not while they go
    // from field to field, nor when something arrives by itself.
    if (!cause || (cause.type !== "submit" && cause.type !== "click")) return;
    focusOn(target.querySelector("[data-faults]") || target.querySelector("[data-focus]"));
  });

  function closeNote(note) {
    note.remove();
    if (opener && document.contains(opener)) opener.focus();
    opener = null;
  }

  document.addEventListener("keydown", function (event) {
    var note = document.querySelector("dialog.why[open]");
    if (event.key === "Escape" && note) closeNote(note);
  });

  document.addEventListener("close", function (event) {
    if (event.target.matches("dialog.why")) closeNote(event.target);
  }, true);

  document.addEventListener("click", function (event) {
    if (event.target.closest("[data-print]")) window.print();
  });

  // A place in a text that is being written is shown there; without a field to
  // write in, the link leads to the numbered lines.
  document.addEventListener("click", function (event) {
    var link = event.target.closest("[data-line]");
    var field = document.querySelector("form.edit textarea");
    if (!link || !field || event.ctrlKey || event.metaKey) return;
    event.preventDefault();
    var lines = field.value.split("\n");
    var line = Math.min(Number(link.dataset.line), lines.length) - 1;
    var start = lines.slice(0, line).join("\n").length + (line > 0 ? 1 : 0);
    var column = Math.min(Number(link.dataset.column) - 1, lines[line].length);
    field.focus();
    field.setSelectionRange(start + column, start + lines[line].length);
    field.scrollTop = Math.max(0, line * parseFloat(getComputedStyle(field).lineHeight) - field.clientHeight / 3);
  });

  // A list of faults on a page that came whole gets the focus as well.
  document.addEventListener("DOMContentLoaded", function () {
    focusOn(document.querySelector("[data-faults]"));
  });
})();
