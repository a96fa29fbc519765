import { SlewKeyTurn } from '../key-turn.js';

if (!customElements.get('slew-key-turn')) customElements.define('slew-key-turn', SlewKeyTurn);
