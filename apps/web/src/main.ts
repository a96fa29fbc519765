import '@slewcurve/elements/define/chart';
