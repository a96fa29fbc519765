import { SlewPlaybackMatrix } from '../playback-matrix.js';

if (!customElements.get('slew-playback-matrix'))
  customElements.define('slew-playback-matrix', SlewPlaybackMatrix);
