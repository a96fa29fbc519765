import { SlewJobCard } from '../job-card.js';

if (!customElements.get('slew-job-card')) customElements.define('slew-job-card', SlewJobCard);
