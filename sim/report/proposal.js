// Long tables can be sorted by a column and filtered by words; without this script they are plain tables.
(function () {
  "use strict";
  var long = 24;

  function number(text) {
    var found = text.replace(/,/g, "").match(/^[+\-]?\d+(\.\d+)?/);
    return found ? parseFloat(found[0]) : NaN;
  }

  function sort(table, head, column) {
    var up = head.getAttribute("aria-sort") !== "ascending";
    var body = table.tBodies[0];
    var rows = Array.prototype.slice.call(body.rows);
    rows.sort(function (a, b) {
      var x = a.cells[column].textContent, y = b.cells[column].textContent;
      var m = number(x), n = number(y);
      var order = isNaN(m) || isNaN(n) ? x.localeCompare(y, "en", { numeric: true }) : m - n;
      return up ? order : -order;
    });
    Array.prototype.forEach.call(table.tHead.rows[0].cells, function (cell) { cell.removeAttribute("aria-sort"); });
    head.setAttribute("aria-sort", up ? "ascending" : "descending");
    rows.forEach(function (row) { body.appendChild(row); });
  }

  function filter(table, words, told) {
    var rows = table.tBodies[0].rows, shown = 0;
    Array.prototype.forEach.call(rows, function (row) {
      var text = Array.prototype.map.call(row.cells, function (cell) { return cell.textContent; }).join(" ").toLowerCase();
      row.hidden = !words.every(function (word) { return text.indexOf(word) >= 0; });
      shown += row.hidden ? 0 : 1;
    });
    told.textContent = shown + " of " + rows.length + " rows";
  }

  function tools(table, name) {
    var box = document.createElement("p"), label = document.createElement("label");
    var input = document.createElement("input"), told = document.createElement("output");
    box.className = "tools";
    input.type = "search";
    label.textContent = "Show rows with ";
    label.appendChild(input);
    box.appendChild(label);
    box.appendChild(told);
    told.textContent = table.tBodies[0].rows.length + " rows";
    input.setAttribute("aria-label", "Show rows with these words: " + name);
    input.addEventListener("input", function () {
      filter(table, input.value.toLowerCase().split(/\s+/).filter(Boolean), told);
    });
    return box;
  }

  Array.prototype.forEach.call(document.querySelectorAll(".table"), function (region) {
    var table = region.querySelector("table");
    if (!table || !table.tBodies[0] || table.tBodies[0].rows.length <= long) return;
    region.parentNode.insertBefore(tools(table, region.getAttribute("aria-label")), region);
    Array.prototype.forEach.call(table.tHead.rows[0].cells, function (head, column) {
      var button = document.createElement("button");
      button.type = "button";
      while (head.firstChild) button.appendChild(head.firstChild);
      head.appendChild(button);
      button.addEventListener("click", function () { sort(table, head, column); });
    });
  });
})();
