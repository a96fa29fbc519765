import { SlewCloseUp } from '../close-up.js';

if (!customElements.get('slew-close-up')) customElements.define('slew-close-up', SlewCloseUp);
