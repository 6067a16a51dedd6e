// Draws a history (median with band, a level, bars, surveys) from the page's data in place of the server's drawing.
import { colour, dataOf, proportion, takeOver } from "./chart.js";

const SHAPES = ["circle", "rect", "triangle", "rectRot", "cross", "crossRot", "star"];

function datasets(h, canvas) {
  const water = colour(canvas, 0);
  const ink = colour(canvas, 1);
  const line = (label, data, more) => ({ type: "line", label, data, borderColor: water, borderWidth: 2, pointRadius: 0, ...more });
  return [
    line(h.words.mid, h.mid, { pointStyle: "line" }),
    line("", h.low, { borderWidth: 0.75 }),
    line(h.words.band, h.high, { borderWidth: 0.75, pointStyle: "rect", fill: "-1", backgroundColor: /^#[0-9a-f]{6}$/i.test(water) ? water + "33" : "transparent" }),
    line(h.words.level, [{ x: h.from, y: h.level }, { x: h.to, y: h.level }], { borderColor: ink, borderDash: [6, 4], borderWidth: 1.5, pointStyle: "line" }),
    ...h.points.map((s, i) => line(s.name, s.points, { showLine: false, borderColor: ink, backgroundColor: "transparent", pointStyle: SHAPES[i % SHAPES.length], pointRadius: 5, borderWidth: 1.5 })),
    ...(h.bars.length === 0 ? [] : [{ type: "bar", label: h.words.bars, data: h.bars, backgroundColor: ink, pointStyle: "rect", barThickness: thickness(h, canvas) }]),
  ];
}

// half of a season's room, so that bars stay apart on a phone
const thickness = (h, canvas) => Math.max(2, Math.min(8, (0.4 * canvas.parentElement.clientWidth) / h.mid.length));

// whole seasons, at most about a dozen
function seasons(h) {
  const first = Math.ceil(h.from);
  const count = Math.floor(h.to) - first + 1;
  const step = Math.ceil(count / 12);
  return Array.from({ length: Math.ceil(count / step) }, (_, i) => ({ value: first + i * step }));
}

// the legend shows the dashes that the lines have
const dashed = chart => window.Chart.defaults.plugins.legend.labels.generateLabels(chart)
  .map(item => ({ ...item, lineDash: chart.data.datasets[item.datasetIndex].borderDash }));

function drawHistory(canvas) {
  if (!takeOver(canvas)) return;
  const h = dataOf(canvas);
  new window.Chart(canvas, {
    type: "line",
    data: { datasets: datasets(h, canvas) },
    options: {
      animation: false,
      aspectRatio: proportion(canvas, 2.2),
      scales: {
        x: { type: "linear", offset: false, min: h.from, max: h.to, title: { display: true, text: h.xLabel }, afterBuildTicks: axis => { axis.ticks = seasons(h); }, ticks: { callback: v => String(v) } },
        y: { min: 0, max: h.yMax, title: { display: true, text: h.yLabel }, ticks: { includeBounds: false } },
      },
      plugins: { legend: { labels: { usePointStyle: true, generateLabels: dashed, color: colour(canvas, 1), filter: item => item.text !== "" } } },
    },
  });
}

document.querySelectorAll("canvas.history").forEach(drawHistory);
