/** An invented worksheet that the browser tests use: a tank's level under a leak, held by a valve. */
export const TANK = `# Tank level under a slow leak

The level of a buffer tank is held by an inflow valve. It settles {e_ss} off.

## Plant and gain

\`\`\`loop
A  is 1.5 m^2 ± 5 %            # cross-section
q  is 0.4 L/s from 0 to 1 L/s  # leak
Kp is 0.02 m^2/s               # valve gain
tune Kp from 0.005 to 0.1 m^2/s
A, Kp are positive
\`\`\`

## Loop and requirements

\`\`\`loop
loop level driven by r, d
  A h' = u - d
  u = Kp (r - h)
  e = r - h

case leak of level
  d = step(q)

level(d -> e)
e_ss = final(leak.e) in mm
require stable(level)              # R-1 stable
require abs(e_ss) <= 25 mm         # R-2 offset
\`\`\`
`;

/** An invented worksheet with a gain plane: a drum drive with an integral term. */
export const DRUM = `# Drum drive

\`\`\`loop
J  is 0.8 kg m^2
b  is 0.4 N m s/rad
Kp is 6 N m/rad
Ki is 1 N m/(rad s)
tune Kp from 0 to 20 N m/rad
tune Ki from 0 to 10 N m/(rad s)
J, b are positive

loop drum driven by w
  J theta'' + b theta' = T + w
  T = -(Kp + Ki/s) theta

require stable(drum)   # R-1 stable
draw region of Kp, Ki where stable(drum) titled "Stable gains"
\`\`\`
`;
