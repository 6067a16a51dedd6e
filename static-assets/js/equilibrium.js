// Draws an equilibrium diagram from the page's data in place of the drawing that the server made.
import { colour, dataOf, proportion, takeOver } from "./chart.js";
import { directLabels } from "./labels.js";

const SHAPES = ["circle", "rect", "triangle", "rectRot", "cross", "crossRot", "triangle", "star"];
const MARKER_EVERY = 9;

const box = b => [[b.left, b.bottom], [b.right, b.bottom], [b.right, b.top], [b.left, b.top], [b.left, b.bottom]].map(([x, y]) => ({ x, y }));

function datasets(s, words, ink, several) {
  const width = s.style < 8 ? 2 : 4;
  const shape = SHAPES[s.style % 8];
  const rotation = s.style % 8 === 6 ? 180 : 0;
  const line = (label, data, more) => ({ label, data, showLine: true, borderColor: ink, backgroundColor: ink, borderWidth: width, pointRadius: 0, ...more });
  const dots = (label, data, more) => ({ label, data, showLine: false, borderColor: ink, backgroundColor: ink, ...more });
  const marked = c => (several && (c.dataIndex + s.style) % MARKER_EVERY === 4 ? 5 : 0);
  const faint = ink + "33";
  return [
    dots(words.fold, [s.fold], { pointRadius: 6, borderWidth: 2, backgroundColor: "transparent" }),
    dots(words.now, [s.now], { pointRadius: 5, direct: several ? s.name : "" }),
    line(words.stable, s.stable, { pointStyle: shape, rotation, pointRadius: marked, pointBackgroundColor: "transparent" }),
    line(words.unstable, s.unstable, { borderDash: [6, 4] }),
    line("50 %", box(s.half), { borderWidth: 1.5 }),
    line("80 %", box(s.most), { borderWidth: 0.75 }),
    ...(s.limit === null ? [] : [dots(words.limit, [{ x: s.limit, y: 0 }], { pointStyle: "line", rotation: 90, pointRadius: 12, borderWidth: 3, clip: false })]),
    ...(s.focus ? [
      dots(words.cloud, s.cloud, { pointRadius: 1.5 }),
      line(words.band, s.band, { borderWidth: 0, fill: "shape", backgroundColor: /^#[0-9a-f]{6}$/i.test(ink) ? faint : "transparent" }),
      dots("", s.arrows, { pointStyle: "triangle", pointRadius: 4, borderWidth: 1, backgroundColor: "transparent", rotation: c => (s.arrows[c.dataIndex].up ? 0 : 180) }),
    ] : []),
  ].map(d => ({ ...d, stock: s.name }));
}

export function drawEquilibrium(canvas) {
  if (!takeOver(canvas)) return;
  const data = dataOf(canvas);
  const axis = (text, max) => ({ type: "linear", min: 0, max, title: { display: true, text }, ticks: { maxTicksLimit: 7, includeBounds: false } });
  new window.Chart(canvas, {
    type: "scatter",
    data: { datasets: data.stocks.flatMap(s => datasets(s, data.words, colour(canvas, s.style), data.stocks.length > 1)) },
    options: {
      animation: false,
      aspectRatio: proportion(canvas, 1.5),
      scales: { x: axis(data.xLabel, data.xMax), y: axis(data.yLabel, data.yMax) },
      plugins: {
        legend: { display: false },
        tooltip: { filter: item => item.dataset.label !== "", callbacks: { label: i => `${i.dataset.stock}, ${i.dataset.label}: ${i.formattedValue}` } },
      },
    },
    plugins: [directLabels],
  });
}
