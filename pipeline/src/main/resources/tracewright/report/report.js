
(function () {
  'use strict';
  function key(cell) {
    var v = cell.getAttribute('data-v');
    return v === null ? cell.textContent : v === '' ? null : Number(v);
  }
  function order(a, b) {
    if (typeof a === 'number') { return a - b; }
    return a.localeCompare(b, 'en', {numeric: true});
  }
  function sort(table, column, up) {
    var body = table.tBodies[0];
    var rows = Array.from(body.rows).map(function (row) { return {row: row, key: key(row.cells[column])}; });
    var known = rows.filter(function (r) { return r.key !== null; });
    var unknown = rows.filter(function (r) { return r.key === null; });
    known.sort(function (a, b) { return (up ? 1 : -1) * order(a.key, b.key); });
    known.concat(unknown).forEach(function (r) { body.appendChild(r.row); });
  }
  document.querySelectorAll('table.sortable').forEach(function (table) {
    var heads = Array.from(table.tHead.rows[0].cells);
    heads.forEach(function (head, column) {
      var button = document.createElement('button');
      button.type = 'button';
      button.textContent = head.textContent;
      head.textContent = '';
      head.appendChild(button);
      button.addEventListener('click', function () {
        var up = head.getAttribute('aria-sort') !== 'ascending';
        heads.forEach(function (h) { h.removeAttribute('aria-sort'); });
        head.setAttribute('aria-sort', up ? 'ascending' : 'descending');
        sort(table, column, up);
      });
    });
  });
  window.addEventListener('beforeprint', function () {
    document.querySelectorAll('details').forEach(function (d) { d.open = true; });
  });
}());
