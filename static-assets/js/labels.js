// Names beside the present positions, so that no legend has to be matched by colour; the highest first, each below
// the one before and joined to its position by a thin line.
import { role } from "./chart.js";

const LINE = 16;
const ASIDE = 16;

export const directLabels = {
  id: "directLabels",
  afterDatasetsDraw(chart) {
    const { ctx, chartArea } = chart;
    const middle = (chartArea.left + chartArea.right) / 2;
    const named = chart.data.datasets
      .map((d, i) => ({ name: d.direct, ink: d.borderColor, at: chart.getDatasetMeta(i).data[0] }))
      .filter(l => l.name && l.at)
      .sort((a, b) => a.at.y - b.at.y);
    let free = chartArea.top;
    const heights = named.map(({ at }) => (free = Math.max(free, at.y - 4) + LINE) - LINE);
    let lowest = chartArea.bottom - LINE / 2;
    for (let i = heights.length - 1; i >= 0; i--) {
      heights[i] = Math.min(heights[i], lowest);
      lowest = heights[i] - LINE;
    }
    ctx.save();
    ctx.font = `${window.Chart.defaults.font.size}px ${window.Chart.defaults.font.family}`;
    ctx.textBaseline = "middle";
    named.forEach(({ name, ink, at }, i) => {
      const side = at.x < middle ? 1 : -1;
      const width = ctx.measureText(name).width;
      const start = side > 0 ? at.x + ASIDE + 3 : at.x - ASIDE - 3 - width;
      const x = Math.max(chartArea.left + 3, Math.min(start, chartArea.right - width));
      const y = heights[i];
      ctx.strokeStyle = ctx.fillStyle = ink;
      ctx.beginPath();
      ctx.moveTo(at.x, at.y);
      ctx.lineTo(at.x + side * ASIDE, y);
      ctx.lineWidth = 1;
      ctx.stroke();
      ctx.lineWidth = 4;
      ctx.strokeStyle = role(chart.canvas, "--paper");
      ctx.strokeText(name, x, y);
      ctx.fillText(name, x, y);
    });
    ctx.restore();
  },
};
