import './close-up.js';
import { SlewChart } from '../chart.js';

if (!customElements.get('slew-chart')) customElements.define('slew-chart', SlewChart);
