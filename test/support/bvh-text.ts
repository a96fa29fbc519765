/** A crane's boom with a hook: mixed channel orders, rotation before position, an end site, padded and tabbed columns. */
export const BOOM = `HIERARCHY
ROOT Mast
{
\tOFFSET 0.00 1.50 0.00
\tCHANNELS 6 Zrotation Xrotation Yrotation Xposition Yposition Zposition
\tJOINT Long Boom
\t{
\t\tOFFSET 0 4 0.25
\t\tCHANNELS 3 Yrotation Xrotation Zrotation
\t\tEnd Site
\t\t{
\t\t\tOFFSET 0 0 9
\t\t}
\t}
\tJOINT Winch {
\t\tOFFSET -1 0 0
\t\tCHANNELS 1 Xrotation
\t}
}
MOTION
Frames: 3
Frame Time: 0.04
  0.000  10.000   -5.500 1 2 3\t350.00\t0\t-.250\t-1080.0
 12.000 200.000    5.500 1 2 3\t370.00\t0\t-.125\t  -45.0
 24.000 390.000    0.000 1 2 3\t380.00\t0\t +.500\t1e2
`;
