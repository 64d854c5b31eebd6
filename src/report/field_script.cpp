#include "field_drawing.hpp"

namespace dutygauge::report {

const std::string_view trend_script = R"js(
(function () {
  var data = JSON.parse(document.getElementById('trend-data').textContent);
  var box = document.getElementById('trend'), days = data.days;
  if (!days.length) return;
  box.hidden = false;
  var W = 960, H = 360, L = 64, R = 20, T = 28, B = 34, NS = 'http://www.w3.org/2000/svg';
  var first = days[0][0], last = days[days.length - 1][0];
  if (data.law.length) last = Math.max(last, data.law[data.law.length - 1][0]);
  if (!(last > first)) last = first + 1;
  var from = first, to = last, drag = null;
  var svg = box.querySelector('svg'), said = document.getElementById('trend-said');

  function iso(day) { return new Date((data.start + day * 86400) * 1000).toISOString().slice(0, 10); }
  function make(name, set, text) {
    var e = document.createElementNS(NS, name);
    for (var k in set) e.setAttribute(k, set[k]);
    if (text !== undefined) e.textContent = text;
    svg.appendChild(e);
    return e;
  }
  function x(day) { return L + (day - from) / (to - from) * (W - L - R); }
  function dayAt(event) {
    var r = svg.getBoundingClientRect(), px = (event.clientX - r.left) / r.width * W;
    return from + Math.min(Math.max((px - L) / (W - L - R), 0), 1) * (to - from);
  }
  function inside(p) { return p[0] >= from && p[0] <= to; }
  function step(span) {
    var p = Math.pow(10, Math.floor(Math.log10(span / 5))), q = span / 5 / p;
    return p * (q < 1.5 ? 1 : q < 3.5 ? 2 : q < 7.5 ? 5 : 10);
  }

  function draw() {
    while (svg.firstChild) svg.removeChild(svg.firstChild);
    var shown = days.filter(inside), law = data.law.filter(inside);
    var low = 0, high = data.allowed === null ? 0 : data.allowed;
    shown.forEach(function (d) { low = Math.min(low, d[1]); high = Math.max(high, d[3]); });
    law.forEach(function (p) { high = Math.max(high, p[1]); });
    if (!(high > low)) high = low + 1;
    high += 0.04 * (high - low);
    function y(v) { return H - B - (v - low) / (high - low) * (H - T - B); }
    var s = step(high - low), v, i, path = '', bars = '', open = false;
    for (v = Math.ceil(low / s) * s; v <= high; v += s) {
      make('path', { 'class': 'grid', d: 'M' + L + ' ' + y(v) + 'H' + (W - R) });
      make('text', { x: L - 6, y: y(v) + 4, 'text-anchor': 'end' }, String(+v.toPrecision(3)));
    }
    make('text', { x: 4, y: 14 }, 'fouling, ' + data.unit);
    for (i = 0; i <= 6; i++) {
      v = from + (to - from) * i / 6;
      make('path', { 'class': 'grid', d: 'M' + x(v) + ' ' + (H - B) + 'v5' });
      make('text', { x: x(v), y: H - 12, 'text-anchor': i === 0 ? 'start' : i === 6 ? 'end' : 'middle' }, iso(v));
    }
    shown.forEach(function (d, k) {
      bars += 'M' + x(d[0]) + ' ' + y(d[1]) + 'V' + y(d[3]);
      open = open && d[0] - shown[k - 1][0] < 1.5;
      path += (open ? 'L' : 'M') + x(d[0]) + ' ' + y(d[2]);
      open = true;
    });
    make('path', { 'class': 'range', d: bars });
    make('path', { 'class': 'days', d: path });
    make('path', { 'class': 'law', d: law.map(function (p, k) { return (k ? 'L' : 'M') + x(p[0]) + ' ' + y(p[1]); }).join('') });
    if (data.allowed !== null) {
      make('path', { 'class': 'allowed', d: 'M' + L + ' ' + y(data.allowed) + 'H' + (W - R) });
      make('text', { x: L + 6, y: y(data.allowed) - 5 }, 'allowed');
    }
    data.events.forEach(function (at, k) {
      if (at < from || at > to) return;
      make('path', { 'class': 'event', d: 'M' + x(at) + ' ' + T + 'V' + (H - B) });
      make('text', { x: x(at), y: T - 4, 'text-anchor': 'middle' }, String(k + 1));
    });
    said.textContent = iso(from) + ' to ' + iso(to);
  }
  function look(a, b) {
    if (b - a < 2) { var m = (a + b) / 2; a = m - 1; b = m + 1; }
    from = Math.max(first, a);
    to = Math.min(last, b);
    draw();
  }
  function all() { look(first, last); }

  svg.addEventListener('pointerdown', function (e) {
    drag = { day: dayAt(e), mark: make('rect', { 'class': 'chosen', y: T, height: H - T - B, x: 0, width: 0 }) };
    svg.setPointerCapture(e.pointerId);
  });
  svg.addEventListener('pointermove', function (e) {
    if (!drag) return;
    var a = x(drag.day), b = x(dayAt(e));
    drag.mark.setAttribute('x', Math.min(a, b));
    drag.mark.setAttribute('width', Math.abs(b - a));
  });
  svg.addEventListener('pointerup', function (e) {
    if (!drag) return;
    var a = drag.day, b = dayAt(e);
    drag = null;
    if (Math.abs(x(b) - x(a)) > 6) look(Math.min(a, b), Math.max(a, b)); else draw();
  });
  svg.addEventListener('pointercancel', function () { drag = null; draw(); });
  svg.addEventListener('dblclick', all);
  document.getElementById('trend-all').addEventListener('click', all);
  svg.addEventListener('keydown', function (e) {
    var span = to - from, mid = (from + to) / 2;
    if (e.key === '+') look(mid - span / 4, mid + span / 4);
    else if (e.key === '-') look(mid - span, mid + span);
    else if (e.key === 'ArrowLeft') look(Math.max(first, from - span / 4), Math.max(first, from - span / 4) + span);
    else if (e.key === 'ArrowRight') look(Math.min(last, to + span / 4) - span, Math.min(last, to + span / 4));
    else if (e.key === 'Escape') all();
    else return;
    e.preventDefault();
  });
  draw();
})();
)js";

}  // namespace dutygauge::report
