import '@slewcurve/elements/define/chart';
import '@slewcurve/elements/define/job-card';
import '@slewcurve/elements/define/playback-matrix';
import '@slewcurve/elements/define/key-turn';
import '@slewcurve/elements/define/porthole';
import '@slewcurve/elements/define/roster';
import '@slewcurve/elements/define/sentence';
import { SlewAcceptForm } from './pages/accept-form.js';
import { SlewApp } from './pages/app.js';
import { SlewAskConventions } from './pages/ask-conventions.js';
import { SlewChartPage } from './pages/chart-page.js';

customElements.define('slew-accept-form', SlewAcceptForm);
customElements.define('slew-ask-conventions', SlewAskConventions);
customElements.define('slew-chart-page', SlewChartPage);
customElements.define('slew-app', SlewApp);
