/**
 * Draws the polar diagram from the data in the page: one line per wind speed, best-VMG states as diamonds. Plain
 * script, run in the reader's browser; it fetches nothing.
 */
export const PAGE_SCRIPT = `
(function () {
  'use strict';
  var data = JSON.parse(document.getElementById('polar-data').textContent);
  var place = document.getElementById('polar');
  var dark = window.matchMedia('(prefers-color-scheme: dark)');
  var narrow = window.matchMedia('(max-width: 560px)');
  var printing = false;
  function ink(name) { return getComputedStyle(document.documentElement).getPropertyValue(name).trim(); }
  function isDark() { return dark.matches && !printing; }
  function traces() {
    var colours = isDark() ? data.colours.dark : data.colours.light;
    var out = [];
    data.curves.forEach(function (c, i) {
      var colour = colours[i % colours.length];
      var dash = data.dashes[i % data.dashes.length];
      if (c.band) out.push({
        type: 'scatterpolar', mode: 'lines', name: c.name + ', band', legendgroup: c.name, showlegend: false, hoverinfo: 'skip',
        r: c.band.speed, theta: c.band.angle, fill: 'toself', fillcolor: colour + '22', line: { width: 0, color: colour }
      });
      out.push({
        type: 'scatterpolar', mode: c.mode, name: c.name, legendgroup: c.name,
        r: c.speed, theta: c.angle, text: c.label, textposition: c.labelPlace, cliponaxis: false,
        textfont: { color: colour, size: narrow.matches ? 10 : 12 }, customdata: c.facts, hovertemplate: data.hover, connectgaps: false,
        line: { color: colour, width: 2, dash: dash },
        marker: { color: colour, size: c.marks.map(function (m) { return m ? 6 : c.speed.length > 1 ? 0 : 5; }), symbol: c.marks.map(function (m) { return m || 'circle'; }), line: { width: 1.2, color: colour } }
      });
      out.push({
        type: 'scatterpolar', mode: 'markers', name: c.name + ', best VMG', legendgroup: c.name, showlegend: false,
        r: c.best.speed, theta: c.best.angle, customdata: c.best.facts, hovertemplate: data.hover, cliponaxis: false,
        marker: { color: colour, size: 10, symbol: 'diamond', line: { color: printing ? '#ffffff' : ink('--sheet'), width: 1.5 } }
      });
    });
    return out;
  }
  function layout() {
    var text = printing ? '#000000' : ink('--ink');
    var grid = printing ? '#cccccc' : ink('--grid');
    var sheet = printing ? '#ffffff' : ink('--sheet');
    return {
      autosize: !printing, width: printing ? 480 : undefined, height: printing ? 720 : undefined, paper_bgcolor: sheet, plot_bgcolor: sheet, hovermode: 'closest',
      font: { color: text, size: narrow.matches ? 11 : 13, family: 'system-ui, "Segoe UI", Roboto, sans-serif' },
      margin: { l: narrow.matches ? 56 : 64, r: 40, t: 26, b: narrow.matches ? 120 : 84 },
      legend: { orientation: 'h', x: 0, y: -0.05, yanchor: 'top', bgcolor: 'rgba(0,0,0,0)', itemwidth: 40 },
      hoverlabel: { font: { size: 13 }, align: 'left' },
      polar: {
        bgcolor: sheet, sector: [-90, 90],
        angularaxis: { direction: 'clockwise', rotation: 90, dtick: 15, ticksuffix: '\\u00b0', gridcolor: grid, linecolor: grid },
        radialaxis: {
          angle: 90, range: [0, data.top], gridcolor: grid, linecolor: text, tickcolor: text, nticks: 9, side: 'counterclockwise', tickangle: 90,
          title: { text: '' }
        }
      }
    };
  }
  function draw() {
    return Plotly.react(place, traces(), layout(), {
      responsive: true, displaylogo: false, modeBarButtonsToRemove: ['lasso2d', 'select2d'],
      toImageButtonOptions: { filename: data.file }
    });
  }
  draw();
  dark.addEventListener('change', draw);
  narrow.addEventListener('change', draw);
  var opened = [];
  window.addEventListener('beforeprint', function () {
    printing = true;
    document.querySelectorAll('details:not([open])').forEach(function (d) { d.open = true; opened.push(d); });
    draw();
  });
  window.addEventListener('afterprint', function () {
    printing = false;
    opened.forEach(function (d) { d.open = false; });
    opened = [];
    draw();
  });
})();
`;
