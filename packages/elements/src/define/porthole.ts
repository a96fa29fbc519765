import { SlewPorthole } from '../porthole.js';

if (!customElements.get('slew-porthole')) customElements.define('slew-porthole', SlewPorthole);
