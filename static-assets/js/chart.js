// What every chart of the page shares: its data, its colours, and its place beside the server's drawing.
const ROLES = ["--water", "--ink", "--moss", "--ochre", "--plum"];

export const role = (element, name) => getComputedStyle(element).getPropertyValue(name).trim() || getComputedStyle(element).color;

export const colour = (element, i) => role(element, ROLES[i % ROLES.length]);

export const dataOf = canvas => JSON.parse(document.getElementById(canvas.dataset.chart).textContent);

/** Width to height; on a phone a chart needs height more than it has width. */
export const proportion = (canvas, wide) => (canvas.parentElement.clientWidth < 480 ? 1 : wide);

/** Shows the canvas and hides the drawing beside it; false where charts are not to be had. */
export function takeOver(canvas) {
  if (!window.Chart) return false;
  const { defaults } = window.Chart;
  defaults.color = role(canvas, "--ink-soft");
  defaults.borderColor = role(canvas, "--line");
  defaults.font.family = getComputedStyle(canvas).fontFamily;
  defaults.font.size = 13;
  canvas.parentElement.hidden = false;
  canvas.closest("figure").querySelector("[data-drawing]").hidden = true;
  return true;
}
