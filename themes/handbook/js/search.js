/*
 * Search over the handbook's own index, from a server or from disk. Plain scripts are added to the
 * page when the box is first used: a core of titles, names and headings; the shards that a query's
 * words lie in; the texts of the results that are shown. Without this script there is no box, and
 * the lists lead everywhere.
 */
"use strict";
var handbookSearch = (function () {
  var SHOWN = 12;      /* results in the list */
  var SHARDS = 6;      /* shards that the beginning of one word may load; a longer one needs fewer */
  var BEFORE = 40, LONG = 150;   /* characters of context */
  var root = document.currentScript.getAttribute("data-root");
  var core = null, names = [], first = [], pageOf = [], headings = {};
  var words = {}, texts = {}, asked = {};
  var place, box, list, told, links = [], last = "";

  /* ---- words, as publish/search.py folds them ---- */

  function fold(text) {
    return text.normalize("NFKD").toLowerCase().replace(/[\u0300-\u036f]/g, "")
      .replace(/ß/g, "ss").replace(/ς/g, "σ");
  }
  function wordsOf(text) {
    return fold(text).match(/[\p{L}\p{N}]+(?:[.,][0-9]+)*/gu) || [];
  }
  function begins(text, word) { return text.slice(0, word.length) === word; }
  function has(known, asking) { return asking.some(function (word) { return begins(known, word); }); }

  /* ---- loading ---- */

  function load(address) {
    if (asked[address]) { return; }
    asked[address] = true;
    var script = document.createElement("script");
    script.src = root + "search/" + address;
    script.onerror = function () {
      asked[address] = false;
      script.remove();
      tell("The index of this handbook cannot be read.");
    };
    document.head.appendChild(script);
  }
  function settle(given) {
    core = given;
    core.pages.forEach(function (page, number) {
      first.push(pageOf.length);
      names.push(" " + page[3] + " ");
      for (var i = 0; i <= page[4].length / 2; i++) { pageOf.push(number); }
    });
  }
  /* The last shard that begins at or before a word, and those after it that begin with the word. */
  function shardsOf(word) {
    var low = 0, high = core.words.length - 1, found = [];
    while (low < high) {
      var middle = (low + high + 1) >> 1;
      if (core.words[middle] <= word) { low = middle; } else { high = middle - 1; }
    }
    if (core.words.length) { found.push(low); }
    while (word.length > 1 && found.length < SHARDS && ++low < core.words.length && begins(core.words[low], word)) {
      found.push(low);
    }
    return found;
  }
  function sectionsOf(where, each) {
    var at = 0, i, bit;
    if (typeof where !== "string") {
      for (i = 0; i < where.length; i++) { at += where[i]; each(at); }
      return;
    }
    var bits = atob(where);
    for (i = 0; i < bits.length; i++) {
      for (at = bits.charCodeAt(i), bit = 0; at; at >>= 1, bit++) { if (at & 1) { each(8 * i + bit); } }
    }
  }

  /* ---- searching: every word must be on the page, in its names or in its sections ---- */

  function find(asking) {
    var waiting = false, pages = null, sections = {};
    asking.forEach(function (word) {
      var here = {};
      names.forEach(function (known, number) {
        if (known.indexOf(" " + word + " ") >= 0) { here[number] = 12; }
        else if (word.length > 1 && known.indexOf(" " + word) >= 0) { here[number] = 8; }
      });
      shardsOf(word).forEach(function (number) {
        var shard = words[number];
        if (!shard) { waiting = true; load("words-" + number + ".js"); return; }
        Object.keys(shard).forEach(function (known) {
          if (known !== word && (word.length < 2 || !begins(known, word))) { return; }
          sectionsOf(shard[known], function (section) {
            var page = pageOf[section], held = sections[section] || (sections[section] = {});
            held[word] = true;
            here[page] = Math.max(here[page] || 0, known === word ? 2 : 1);
          });
        });
      });
      if (pages) {
        Object.keys(pages).forEach(function (page) {
          if (page in here) { pages[page] += here[page]; } else { delete pages[page]; }
        });
      } else { pages = here; }
    });
    var whole = {};  /* pages on which one section holds every word */
    Object.keys(sections).forEach(function (section) {
      if (Object.keys(sections[section]).length === asking.length) { whole[pageOf[section]] = true; }
    });
    Object.keys(pages).forEach(function (page) {
      if (whole[page]) { pages[page] += 3; }
      var title = wordsOf(core.pages[page][0]), beside = wordsOf(core.pages[page][2]);
      asking.forEach(function (word) {
        if (holds(title, word)) { pages[page] += 6; }
        if (beside.indexOf(word) >= 0) { pages[page] += 6; }
      });
      if (title.join(" ") === asking.join(" ")) { pages[page] += 20; }
      if (headed(page, asking)) { pages[page] += 8 * asking.length; }
    });
    var order = Object.keys(pages).map(Number).sort(function (a, b) { return pages[b] - pages[a] || a - b; });
    return { order: order, sections: sections, waiting: waiting };
  }
  /* The number of a page's first heading that holds all words; 0 where none does. */
  function headed(page, asking) {
    var known = headings[page] || (headings[page] = core.pages[page][4].map(function (text, at) {
      return at % 2 ? null : wordsOf(text);
    }));
    for (var i = 0; i < known.length; i += 2) {
      if (asking.every(function (word) { return holds(known[i], word); })) { return i / 2 + 1; }
    }
    return 0;
  }
  function holds(known, word) { return known.some(function (one) { return begins(one, word); }); }

  /* The section that holds most of the words; one whose heading holds them all goes before. */
  function bestSection(page, asking, sections) {
    var best = headed(page, asking), most = 0;
    if (best) { return best; }
    for (var i = 0; i <= core.pages[page][4].length / 2; i++) {
      var count = Object.keys(sections[first[page] + i] || {}).length;
      if (count > most) { best = i; most = count; }
    }
    return best;
  }
  /* The paragraph or step of a section that holds most of the words; null while it is loaded. */
  function bestPiece(page, section, asking) {
    var low = 0, pieces, best = ["", ""], most = 0;
    while (low + 1 < core.texts.length && core.texts[low + 1] <= page) { low++; }
    if (!texts[low]) { load("texts-" + low + ".js"); return null; }
    pieces = (texts[low][page - core.texts[low]] || [])[section] || [];
    for (var i = 0; i < pieces.length; i += 2) {
      var known = wordsOf(pieces[i + 1]);
      var count = asking.filter(function (word) { return holds(known, word); }).length;
      if (count > most) { best = [pieces[i], pieces[i + 1]]; most = count; }
    }
    return best;
  }

  /* ---- showing ---- */

  function tell(text) { if (told.textContent !== text) { told.textContent = text; } }

  function search() {
    last = box.value;
    var asking = wordsOf(last).filter(function (word, at, all) { return all.indexOf(word) === at; });
    if (!asking.length) { close(); return; }
    if (!core) { load("core.js"); tell("Looking …"); return; }
    var found = find(asking), shown = found.order.slice(0, SHOWN);
    var count = found.order.length;
    show(shown, asking, found.sections);
    if (found.waiting) { tell("Looking …"); return; }
    tell(!count ? "Nothing is found." : count === 1 ? "1 page" :
      count + " pages" + (count > SHOWN ? ", the first " + SHOWN + " shown" : ""));
  }
  function show(pages, asking, sections) {
    var at = links.indexOf(document.activeElement);
    list.textContent = "";
    links = pages.map(function (page) { return result(page, asking, sections); });
    list.hidden = !pages.length;
    if (at >= 0) { (links[at] || box).focus(); }
  }
  function result(number, asking, sections) {
    var page = core.pages[number], plate = wordsOf(page[0] + " " + page[2]);
    var named = asking.every(function (word) { return holds(plate, word); });
    var section = named ? 0 : bestSection(number, asking, sections);
    var piece = !named && bestPiece(number, section, asking) || ["", ""];
    var goal = piece[0] || (section ? page[4][2 * section - 1] : "");
    var item = document.createElement("li"), link = document.createElement("a");
    link.href = root + page[1] + (goal ? "#" + goal : "");
    link.textContent = page[0];
    item.appendChild(link);
    line(item, "beside", page[2] + (section ? " – " + page[4][2 * section - 2] : "") +
      (/^step-\d+$/.test(goal) ? ", step " + goal.slice(5) : ""));
    if (piece[1]) { context(line(item, "context", ""), piece[1], asking); }
    list.appendChild(item);
    return link;
  }
  function line(item, kind, text) {
    var made = document.createElement("span");
    made.className = kind;
    made.textContent = text;
    item.appendChild(document.createTextNode(" "));
    item.appendChild(made);
    return made;
  }
  /* The words around the first that is met, each that is met marked. */
  function context(into, text, asking) {
    var tokens = text.match(/[\p{L}\p{N}\p{M}]+(?:[.,][0-9]+)*|[^\p{L}\p{N}\p{M}]+/gu) || [];
    var met = tokens.map(function (token) { return wordsOf(token).some(function (known) { return has(known, asking); }); });
    var from = Math.max(0, met.indexOf(true)), room = BEFORE, to = from, length = 0;
    while (from > 0 && room > 0) { from--; room -= tokens[from].length; }
    if (from > 0) { into.appendChild(document.createTextNode("… ")); }
    for (to = from; to < tokens.length && length < LONG; to++) {
      length += tokens[to].length;
      var mark = met[to] ? document.createElement("mark") : null;
      if (mark) { mark.textContent = tokens[to]; }
      into.appendChild(mark || document.createTextNode(tokens[to]));
    }
    if (to < tokens.length) { into.appendChild(document.createTextNode(" …")); }
  }
  function close() {
    list.textContent = "";
    list.hidden = true;
    links = [];
    tell("");
  }

  /* ---- keys ---- */

  function move(by) {
    var at = links.indexOf(document.activeElement) + by;
    if (!links.length) { return; }
    if (at < 0) { box.focus(); } else { links[Math.min(at, links.length - 1)].focus(); }
  }
  function keys(event) {
    if (event.altKey || event.ctrlKey || event.metaKey || event.isComposing) { return; }
    if (event.key === "ArrowDown") { event.preventDefault(); move(1); }
    else if (event.key === "ArrowUp") { event.preventDefault(); move(-1); }
    else if (event.key === "Escape") { event.preventDefault(); box.value = last = ""; close(); box.focus(); }
    else if (event.key === "Enter" && event.target === box && links.length) { event.preventDefault(); links[0].click(); }
  }
  function slash(event) {
    var typing = /^(INPUT|TEXTAREA|SELECT)$/.test(event.target.tagName) || event.target.isContentEditable;
    if (event.key !== "/" || typing || event.ctrlKey || event.metaKey || event.altKey) { return; }
    event.preventDefault();
    box.focus();
  }
  function begin() {
    place = document.getElementById("search");
    if (!place) { return; }
    box = place.querySelector("input");
    list = place.querySelector(".search-found");
    told = place.querySelector("[role=status]");
    place.hidden = false;
    box.addEventListener("focus", function () { load("core.js"); if (list.hidden && box.value) { search(); } });
    box.addEventListener("input", search);
    place.addEventListener("keydown", keys);
    place.addEventListener("focusout", function (event) {
      if (event.relatedTarget && !place.contains(event.relatedTarget)) { close(); }
    });
    list.addEventListener("click", function (event) {
      if (event.target.closest("a")) { window.setTimeout(close, 0); }
    });
    document.addEventListener("pointerdown", function (event) { if (!place.contains(event.target)) { close(); } });
    place.querySelector("form").addEventListener("submit", function (event) { event.preventDefault(); });
    document.addEventListener("keydown", slash);
  }
  if (document.readyState === "loading") { document.addEventListener("DOMContentLoaded", begin); } else { begin(); }

  function again() { if (box && box.value) { search(); } }
  return {
    core: function (given) { settle(given); again(); },
    words: function (number, given) { words[number] = given; again(); },
    texts: function (number, given) { texts[number] = given; again(); }
  };
})();
