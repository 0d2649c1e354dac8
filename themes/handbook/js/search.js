/*
 * Search over the handbook's own index, from a server or from disk. Plain scripts are added to the
 * page when the box is first used: a core of titles, then the shards that a query's words lie in.
 * Without this script there is no box, and the lists lead everywhere.
 */
"use strict";
var handbookSearch = (function () {
  var here = document.currentScript;
  var root = here.getAttribute("data-root");
  var core = null, shards = {}, asked = {}, box, list, status, chosen = -1, found = [];

  function fold(text) {
    return text.normalize("NFKD").replace(/[\u0300-\u036f]/g, "").toLowerCase()
      .replace(/ß/g, "ss").replace(/\u00b5/g, "\u03bc");
  }
  function wordsOf(text) {
    return fold(text).match(/[\p{L}\p{N}]+(?:[.,][0-9]+)*/gu) || [];
  }
  function load(address) {
    if (asked[address]) { return; }
    asked[address] = true;
    var script = document.createElement("script");
    script.src = root + "search/" + address;
    script.onerror = function () { say("The index of this handbook cannot be read."); };
    document.head.appendChild(script);
  }
  function shardOf(word) {
    var begins = word.slice(0, 2), last = 0;
    for (var i = 1; i < core.shards.length; i++) {
      if (core.shards[i] <= begins) { last = i; }
    }
    return last;
  }
  /* A beginning of one letter may lie in several shards: all that can hold it are loaded. */
  function shardsOf(word) {
    var first = shardOf(word), all = [first];
    for (var i = first + 1; i < core.shards.length; i++) {
      if (core.shards[i].slice(0, word.length) === word.slice(0, 2)) { all.push(i); }
    }
    return all;
  }
  function say(text) { status.textContent = text; }

  function search() {
    if (!core) { load("core.js"); return; }
    var words = wordsOf(box.value);
    if (!words.length) { show([], ""); return; }
    var waiting = false;
    words.forEach(function (word) {
      shardsOf(word).forEach(function (number) {
        if (!shards[number]) {
          waiting = true;
          load("words-" + ("00" + number).slice(-3) + ".js");
        }
      });
    });
    if (waiting) { say("Looking …"); return; }
    var scores = null;
    words.forEach(function (word) {
      var here = {};
      shardsOf(word).forEach(function (number) {
        Object.keys(shards[number]).forEach(function (known) {
          if (known.slice(0, word.length) !== word) { return; }
          shards[number][known].forEach(function (page) {
            here[page] = Math.max(here[page] || 0, known === word ? 2 : 1);
          });
        });
      });
      core.pages.forEach(function (page, number) {
        if (!(number in here)) { return; }
        if (wordsOf(page[0] + " " + page[2]).some(function (w) { return w.slice(0, word.length) === word; })) {
          here[number] += 10;
        }
      });
      if (scores === null) { scores = here; return; }
      Object.keys(scores).forEach(function (page) {
        if (page in here) { scores[page] += here[page]; } else { delete scores[page]; }
      });
    });
    var pages = Object.keys(scores).map(Number).sort(function (a, b) {
      return scores[b] - scores[a] || a - b;
    });
    show(pages.slice(0, 30), words);
    say(pages.length === 1 ? "1 page" : pages.length + " pages" + (pages.length > 30 ? ", the first 30 shown" : ""));
  }
  function show(pages, words) {
    list.textContent = "";
    found = [];
    chosen = -1;
    pages.forEach(function (number) {
      var page = core.pages[number], item = document.createElement("li");
      var link = document.createElement("a"), address = page[1];
      var heading = (page[3] || []).filter(function (entry) {
        var said = wordsOf(entry[0]);
        return words.every(function (word) {
          return said.some(function (w) { return w.slice(0, word.length) === word; });
        });
      })[0];
      if (heading) { address += "#" + heading[1]; }
      link.href = root + address;
      link.textContent = page[0];
      item.appendChild(link);
      var beside = document.createElement("span");
      beside.className = "beside";
      beside.textContent = heading ? page[2] + " – " + heading[0] : page[2];
      item.appendChild(document.createTextNode(" "));
      item.appendChild(beside);
      list.appendChild(item);
      found.push(link);
    });
    list.hidden = !pages.length;
    if (!pages.length) { say(words ? "Nothing is found." : ""); }
  }
  function move(by) {
    if (!found.length) { return; }
    chosen = Math.max(-1, Math.min(found.length - 1, chosen + by));
    if (chosen < 0) { box.focus(); } else { found[chosen].focus(); }
  }
  function keys(event) {
    if (event.key === "ArrowDown") { event.preventDefault(); move(1); }
    else if (event.key === "ArrowUp") { event.preventDefault(); move(-1); }
    else if (event.key === "Escape") { box.value = ""; show([], ""); say(""); box.focus(); }
    else if (event.key === "Enter" && event.target === box && found.length) { found[0].click(); }
  }
  function begin() {
    var place = document.getElementById("search");
    if (!place) { return; }
    box = place.querySelector("input");
    list = place.querySelector("ol");
    status = place.querySelector("[role=status]");
    place.hidden = false;
    box.addEventListener("focus", function () { load("core.js"); });
    box.addEventListener("input", search);
    place.addEventListener("keydown", keys);
    place.querySelector("form").addEventListener("submit", function (event) { event.preventDefault(); });
    document.addEventListener("keydown", function (event) {
      var typing = /^(INPUT|TEXTAREA|SELECT)$/.test(event.target.tagName) || event.target.isContentEditable;
      if (event.key === "/" && !typing && !event.ctrlKey && !event.metaKey && !event.altKey) {
        event.preventDefault();
        box.focus();
      }
    });
  }
  if (document.readyState === "loading") { document.addEventListener("DOMContentLoaded", begin); } else { begin(); }
  return {
    core: function (given) { core = given; search(); },
    words: function (number, given) { shards[number] = given; search(); }
  };
})();
