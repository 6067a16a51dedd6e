// Takes over every equilibrium diagram of the page.
import { drawEquilibrium } from "./equilibrium.js";

document.querySelectorAll("canvas.equilibrium").forEach(drawEquilibrium);
