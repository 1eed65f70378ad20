import {
  BarController,
  BarElement,
  Chart,
  Filler,
  LinearScale,
  LineController,
  LineElement,
  PointElement,
  Tooltip,
} from 'chart.js';

// Only the parts that are drawn; the rest of Chart.js stays out of the chunk.
Chart.register(BarController, BarElement, Filler, LinearScale, LineController, LineElement, PointElement, Tooltip);

export { Chart };
