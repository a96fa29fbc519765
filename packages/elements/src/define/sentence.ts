import { SlewSentence } from '../sentence.js';

if (!customElements.get('slew-sentence')) customElements.define('slew-sentence', SlewSentence);
