(function () {
  'use strict';
  var $ = function (q, e) { return (e || document).querySelector(q); };
  var $$ = function (q, e) { return Array.prototype.slice.call((e || document).querySelectorAll(q)); };
  var NS = 'http://www.w3.org/2000/svg';
  var root = document.documentElement, map = $('#map'), marks = $('#marks'), furniture = $('#furniture');
  var rows = $$('#list tbody tr'), sheets = {}, rowOf = {}, idOf = {}, chosen = null;

  rows.forEach(function (tr) {
    var c = tr.dataset.c;
    rowOf[c] = tr;
    idOf[c] = decodeURIComponent($('a', tr).getAttribute('href').slice('#crossing='.length));
    tr.words = tr.textContent.toLowerCase() + ' ' + idOf[c].toLowerCase();
  });
  function register(a) { sheets[a.dataset.c] = a; a.id = 'sheet-' + a.dataset.c; }
  $$('article.sheet').forEach(register);

  /* ---- sheets of a large study come in packs that are opened when wanted ---- */
  var packs = $$('script[data-first]').map(function (e) { return { e: e, first: +e.dataset.first, end: +e.dataset.first + +e.dataset.count, opened: null }; });
  function unpack(pack) {
    if (pack.opened) return pack.opened;
    var bytes = Uint8Array.from(atob(pack.e.textContent), function (c) { return c.charCodeAt(0); });
    pack.opened = new Response(new Blob([bytes]).stream().pipeThrough(new DecompressionStream('deflate'))).text().then(function (text) {
      var found = $$('article.sheet', new DOMParser().parseFromString(text, 'text/html'));
      found.forEach(register);
      pack.e.replaceWith.apply(pack.e, found);
    });
    return pack.opened;
  }
  function withSheet(c, use) {
    if (sheets[c]) { use(sheets[c]); return; }
    var pack = packs.find(function (p) { return c >= p.first && c < p.end; });
    if (pack) unpack(pack).then(function () { if (sheets[c]) use(sheets[c]); });
  }

  /* ---- the view: part of the map that is shown, in map units ---- */
  var W = +map.dataset.w, H = +map.dataset.h, view = { x: 0, y: 0, w: W, h: H }, u = 1, size = { w: 1, h: 1 };
  function spot(g) { var t = g.transform.baseVal.getItem(0).matrix; return [t.e, t.f]; }
  var labels = $$('.m', marks).map(function (g) {
    var p = spot(g);
    return { g: g, c: g.dataset.c, x: p[0], y: p[1], text: $('.lb', g), boxes: null, rank: g.classList.contains('bad') ? 1 : g.classList.contains('look') ? 2 : 3 };
  }).concat($$('.rn, .sn', map).map(function (text) {
    var p = spot(text.parentNode.parentNode);
    return { c: '', x: p[0], y: p[1], text: text, boxes: null, rank: text.classList.contains('rn') ? 0 : 4 };
  })).sort(function (a, b) { return a.rank - b.rank; });

  function measure() {
    var r = map.getBoundingClientRect();
    size = { w: Math.max(1, r.width), h: Math.max(1, r.height) };
  }
  function fit() {
    var s = Math.max(W / size.w, H / size.h);
    view = { w: s * size.w, h: s * size.h };
    view.x = (W - view.w) / 2; view.y = (H - view.h) / 2;
    show();
  }
  function show() {
    u = view.w / size.w;
    map.setAttribute('viewBox', [view.x, view.y, view.w, view.h].map(function (v) { return v.toFixed(2); }).join(' '));
    map.style.setProperty('--u', u.toFixed(4));
    drawFurniture();
    clearTimeout(show.timer);
    show.timer = setTimeout(placeLabels, 60);
  }
  function zoom(f, cx, cy) {
    var w = Math.min(W * 4, Math.max(size.w * 0.1, view.w * f));
    f = w / view.w;
    view = { x: cx + (view.x - cx) * f, y: cy + (view.y - cy) * f, w: w, h: view.h * f };
    show();
  }
  function middle() { return [view.x + view.w / 2, view.y + view.h / 2]; }
  function at(e) {
    var r = map.getBoundingClientRect();
    return [view.x + (e.clientX - r.left) * u, view.y + (e.clientY - r.top) * u];
  }
  function el(name, attributes, text) {
    var n = document.createElementNS(NS, name);
    Object.keys(attributes).forEach(function (k) { n.setAttribute(k, attributes[k]); });
    if (text) n.textContent = text;
    furniture.appendChild(n);
  }
  function drawFurniture() {
    var perUnit = +map.dataset.length, most = 150 * u * perUnit, p = Math.pow(10, Math.floor(Math.log10(most))), n = most / p;
    var bar = p * (n >= 5 ? 5 : n >= 2 ? 2 : 1), px = bar / perUnit / u, name = bar + ' ' + map.dataset.symbol;
    if (map.dataset.symbol === 'm' && bar >= 1000) name = bar / 1000 + ' km';
    furniture.replaceChildren();
    furniture.setAttribute('transform', 'translate(' + view.x + ' ' + view.y + ') scale(' + u + ')');
    var y = size.h - 16, x = size.w - 26;
    el('rect', { 'class': 'plate', x: 8, y: y - 18, width: px + 24, height: 28, rx: 3 });
    el('path', { 'class': 'sb', d: 'M20 ' + (y - 1) + 'v5h' + px + 'v-5' });
    el('text', { x: 20 + px / 2, y: y - 4, 'text-anchor': 'middle' }, name);
    el('rect', { 'class': 'plate', x: x - 16, y: size.h - 60, width: 32, height: 50, rx: 3 });
    el('path', { 'class': 'na', d: 'M' + x + ' ' + (size.h - 55) + 'l7 20l-7-5l-7 5z' });
    el('text', { x: x, y: size.h - 17, 'text-anchor': 'middle' }, 'N');
  }
  /* Texts that would cover a mark or one another step back: first to the id alone, then out of sight. */
  function placeLabels() {
    var taken = [], many = 0;
    labels.forEach(function (l) {
      l.sx = (l.x - view.x) / u; l.sy = (l.y - view.y) / u;
      l.seen = l.sx > -20 && l.sy > -20 && l.sx < size.w + 20 && l.sy < size.h + 20;
      if (l.seen && l.g) many++;
    });
    var few = many < 400;
    if (few) labels.forEach(function (l) { if (l.seen && l.g) taken.push([l.sx - 7, l.sy - 7, l.sx + 7, l.sy + 7, l]); });
    var wanted = labels.filter(function (l) { return l.seen && (few || !l.g || l.c === chosen); });

    // All writes before all reads: each text is measured once, without laying the map out again for every one.
    var fresh = wanted.filter(function (l) { return !l.boxes; });
    fresh.forEach(function (l) { l.text.classList.remove('off', 'brief'); });
    fresh.forEach(function (l) {
      if (l.g) {
        var id = $('.id', l.text).getComputedTextLength(), full = $('.full', l.text).getComputedTextLength();
        l.boxes = [[11, -13, 11 + Math.max(id, full), 15], [11, -13, 11 + id, 2]];
      } else {
        var r = l.text.getBBox();
        l.boxes = [l.rank ? [r.x, r.y, r.x + r.width, r.y + r.height] : [r.x, -21, r.x + r.width, -6]];
      }
    });
    var fits = new Map();
    wanted.filter(function (l) { return l.c === chosen; }).concat(wanted.filter(function (l) { return l.c !== chosen; })).forEach(function (l) {
      var forced = l.c === chosen;
      if ((l.rank ? [0] : [0, -17, 40]).some(function (dy) { return place(l, 0, forced, dy); })) fits.set(l, 0);
      else if (l.g && place(l, 1, false, 0)) fits.set(l, 1);
    });
    labels.forEach(function (l) {
      l.text.classList.toggle('off', !fits.has(l));
      if (fits.has(l)) l.text.classList.toggle('brief', fits.get(l) === 1);
    });
    function place(l, brief, forced, dy) {
      var q = l.boxes[brief], flip = l.g && l.sx + q[2] > size.w - 4, x0 = l.sx + (flip ? -q[2] : q[0]), b = [x0, l.sy + q[1] + dy, x0 + q[2] - q[0], l.sy + q[3] + dy];
      if (!forced && taken.some(function (t) { return t[4] !== l && t[0] < b[2] && b[0] < t[2] && t[1] < b[3] && b[1] < t[3]; })) return false;
      if (!l.rank) l.text.setAttribute('dy', dy);
      if (l.g) l.text.style.transform = flip ? 'translateX(' + -(q[0] + q[2]) + 'px)' : '';
      taken.push(b.concat([l]));
      return true;
    }
  }

  /* ---- moving about ---- */
  map.addEventListener('wheel', function (e) {
    e.preventDefault();
    var p = at(e);
    zoom(Math.exp(Math.max(-1, Math.min(1, e.deltaY * (e.deltaMode ? 0.05 : 0.002)))), p[0], p[1]);
  }, { passive: false });
  var held = {}, moved = false, last = null;
  map.addEventListener('pointerdown', function (e) { if (e.button === 0) { held[e.pointerId] = [e.clientX, e.clientY]; moved = false; last = null; } });
  map.addEventListener('pointermove', function (e) {
    var p = at(e), ids = Object.keys(held), unit = +map.dataset.unit;
    $('#where').textContent = 'x ' + (+map.dataset.west + p[0] * unit).toFixed(1) + '  y ' + (+map.dataset.north - p[1] * unit).toFixed(1);
    if (!held[e.pointerId]) return;
    var dx = e.clientX - held[e.pointerId][0], dy = e.clientY - held[e.pointerId][1];
    if (!moved && Math.abs(dx) + Math.abs(dy) < 4) return;
    if (!moved) { moved = true; try { map.setPointerCapture(e.pointerId); } catch (err) { /* the pointer has gone */ } }
    held[e.pointerId] = [e.clientX, e.clientY];
    if (ids.length === 2) {
      var a = held[ids[0]], b = held[ids[1]], d = Math.hypot(a[0] - b[0], a[1] - b[1]), r = map.getBoundingClientRect();
      if (last && d > 0) zoom(last / d, view.x + ((a[0] + b[0]) / 2 - r.left) * u, view.y + ((a[1] + b[1]) / 2 - r.top) * u);
      last = d;
    } else { view.x -= dx * u; view.y -= dy * u; show(); }
  });
  ['pointerup', 'pointercancel'].forEach(function (n) { map.addEventListener(n, function (e) { delete held[e.pointerId]; last = null; }); });
  map.addEventListener('click', function (e) {
    var hit = e.target.closest('[data-c]');
    if (!moved && hit) choose(hit.dataset.c, false, true);
  });
  map.addEventListener('keydown', function (e) {
    var m = middle(), step = 60 * u;
    if (e.key === '+' || e.key === '=') zoom(0.7, m[0], m[1]);
    else if (e.key === '-') zoom(1 / 0.7, m[0], m[1]);
    else if (e.key === '0') fit();
    else if (e.key.indexOf('Arrow') === 0) {
      view.x += e.key === 'ArrowRight' ? step : e.key === 'ArrowLeft' ? -step : 0;
      view.y += e.key === 'ArrowDown' ? step : e.key === 'ArrowUp' ? -step : 0;
      show();
    } else return;
    e.preventDefault();
  });
  $$('[data-zoom]').forEach(function (b) {
    b.addEventListener('click', function () {
      var m = middle();
      if (b.dataset.zoom === 'all') fit(); else zoom(b.dataset.zoom === 'in' ? 0.6 : 1 / 0.6, m[0], m[1]);
    });
  });
  $$('[data-switch]').forEach(function (box) {
    var key = box.dataset.switch;
    function apply() {
      if (key === 'labels') { marks.classList.toggle('nolabels', !box.checked); return; }
      $$('[data-layer~="' + key + '"]', map).forEach(function (g) { g.classList.toggle('hide', !box.checked); });
    }
    box.addEventListener('change', apply);
    apply();
  });

  /* ---- the selection: list, map, sheet and address stay together ---- */
  function choose(c, pan, reveal) {
    if (!rowOf[c]) return;
    if (chosen !== null) {
      $$('.on').forEach(function (e) { e.classList.remove('on'); });
      rowOf[chosen].removeAttribute('aria-current');
    }
    chosen = c;
    rowOf[c].classList.add('on');
    rowOf[c].setAttribute('aria-current', 'true');
    $$('[data-c="' + c + '"]', map).forEach(function (e) { e.classList.add('on'); });
    withSheet(c, function (sheet) { if (chosen === c) sheet.classList.add('on'); });
    root.classList.add('has');
    $('#chosen').textContent = 'Sheet of crossing ' + idOf[c];
    if (reveal) {
      var box = rowOf[c].closest('.scroll'), top = rowOf[c].offsetTop, head = $('#list thead').offsetHeight;
      if (top - head < box.scrollTop || top + 40 > box.scrollTop + box.clientHeight) box.scrollTop = top - box.clientHeight / 2;
    }
    var mark = labels.find(function (l) { return l.c === c; });
    if (mark) {
      marks.appendChild(mark.g);
      var sx = (mark.x - view.x) / u, sy = (mark.y - view.y) / u;
      if (pan && (sx < 15 || sy < 15 || sx > size.w - 15 || sy > size.h - 15)) { view.x = mark.x - view.w / 2; view.y = mark.y - view.h / 2; show(); }
    }
    placeLabels();
    var hash = '#crossing=' + encodeURIComponent(idOf[c]);
    if (location.hash !== hash) { try { history.replaceState(null, '', hash); } catch (err) { location.hash = hash; } }
  }
  function fromAddress() {
    if (location.hash.indexOf('#crossing=') !== 0) return;
    var id;
    try { id = decodeURIComponent(location.hash.slice('#crossing='.length)); } catch (err) { return; }
    var c = Object.keys(idOf).find(function (k) { return idOf[k] === id; });
    if (c !== undefined && c !== chosen) choose(c, true, true);
  }
  window.addEventListener('hashchange', fromAddress);
  var listBody = $('#list tbody');
  listBody.addEventListener('click', function (e) {
    var tr = e.target.closest('tr');
    if (!tr || e.ctrlKey || e.metaKey) return;
    e.preventDefault();
    choose(tr.dataset.c, true, false);
  });
  function visible() { return $$('#list tbody tr').filter(function (tr) { return !tr.hidden; }); }
  listBody.addEventListener('keydown', function (e) {
    if (e.key !== 'ArrowDown' && e.key !== 'ArrowUp') return;
    var all = visible(), i = all.indexOf(e.target.closest('tr')) + (e.key === 'ArrowDown' ? 1 : -1);
    if (all[i]) { $('a', all[i]).focus(); e.preventDefault(); }
  });
  function step(d) {
    var all = visible(), i = chosen === null ? -1 : all.indexOf(rowOf[chosen]);
    var tr = all[chosen === null ? 0 : (i + d + all.length) % all.length];
    if (tr) choose(tr.dataset.c, true, true);
  }
  $('#prev').addEventListener('click', function () { step(-1); });
  $('#next').addEventListener('click', function () { step(1); });

  /* ---- search, filter, sort ---- */
  function filter() {
    var words = $('#find').value.toLowerCase().split(/\s+/).filter(Boolean), look = $('#look').checked, n = 0;
    rows.forEach(function (tr) {
      tr.hidden = (look && !tr.dataset.look) || !words.every(function (w) { return tr.words.indexOf(w) >= 0; });
      if (!tr.hidden) n++;
    });
    $('#shown').textContent = n === rows.length ? n + (n === 1 ? ' crossing' : ' crossings') : n + ' of ' + rows.length + ' crossings';
    $('#none').hidden = n > 0;
  }
  $('#find').addEventListener('input', filter);
  $('#look').addEventListener('change', filter);
  $$('#list th button').forEach(function (button, column) {
    button.addEventListener('click', function () {
      var th = button.parentNode, number = th.classList.contains('n'), down = th.getAttribute('aria-sort') ? th.getAttribute('aria-sort') === 'ascending' : number && column > 1;
      $$('#list th').forEach(function (h) { h.removeAttribute('aria-sort'); });
      th.setAttribute('aria-sort', down ? 'descending' : 'ascending');
      var key = function (tr) { var td = tr.cells[column]; return number ? (td.dataset.v === undefined ? null : +td.dataset.v) : td.textContent; };
      var compare = new Intl.Collator(undefined, { numeric: true }).compare;
      rows.map(function (tr, i) { return [key(tr), i, tr]; }).sort(function (a, b) {
        if (a[0] === null || b[0] === null) return (a[0] === null) - (b[0] === null) || a[1] - b[1];
        var d = number ? a[0] - b[0] : compare(a[0], b[0]);
        return (down ? -d : d) || a[1] - b[1];
      }).forEach(function (r) { listBody.appendChild(r[2]); });
    });
  });

  /* ---- print: the chosen sheet, or all with map and list ---- */
  function print(all) {
    root.classList.toggle('printall', all);
    window.print();
    root.classList.remove('printall');
  }
  $('#print1').addEventListener('click', function () { if (chosen === null) step(1); print(false); });
  $('#printall').addEventListener('click', function () { Promise.all(packs.map(unpack)).then(function () { print(true); }); });

  new ResizeObserver(function () {
    var before = size.w, m = middle();
    measure();
    if (before === 1) { fit(); return; }
    view = { w: u * size.w, h: u * size.h };
    view.x = m[0] - view.w / 2; view.y = m[1] - view.h / 2;
    show();
  }).observe(map);
  measure();
  fit();
  fromAddress();
})();
