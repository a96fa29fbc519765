import { SlewRoster } from '../roster.js';

if (!customElements.get('slew-roster')) customElements.define('slew-roster', SlewRoster);
