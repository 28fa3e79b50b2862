// While a reading is typed: what it would be read as. Nothing is stored, and without
// this script the button below does the same.
"use strict";
(function () {
  var form = document.getElementById("reading");
  var out = document.getElementById("readback");
  if (!form || !out || !window.fetch || !window.URLSearchParams) {
    return;
  }
  var timer = 0;
  var asked = 0; // the newest question: an answer to an older one is dropped
  var shown = "";

  function typed() {
    var query = new URLSearchParams();
    ["gravity", "temp", "taken", "instrument"].forEach(function (name) {
      query.set(name, form.elements[name] ? form.elements[name].value.trim() : "");
    });
    return query;
  }

  function show(html) {
    if (html !== shown) {
      shown = html;
      out.innerHTML = html;
    }
  }

  function ask() {
    var query = typed();
    var mine = ++asked;
    if (!query.get("gravity") || !query.get("temp")) {
      show("");
      return;
    }
    fetch(form.dataset.readback + "?" + query.toString(), { credentials: "same-origin", redirect: "error" })
      .then(function (answer) {
        return answer.ok || answer.status === 409 || answer.status === 422 ? answer.text() : "";
      })
      .catch(function () {
        return "";
      })
      .then(function (html) {
        if (mine === asked) {
          show(html);
        }
      });
  }

  function later() {
    clearTimeout(timer);
    timer = setTimeout(ask, 400);
  }
  form.addEventListener("input", later);
  form.addEventListener("change", later);
  later(); // what a link or the browser brought back
})();
