/** A worksheet in an invented scenario that uses every statement and most of Markdown's containers. */
export const SAMPLE = `# Sluice gate of the *old mill*

The level error is {e_ss}; $x_{e} = {no}$, \`{neither}\`. See [the {K} note](http://a.example/{no}).

\`\`\`loop
A is 240 m^2 ± 8 %     # pond, at mean level
k is 0.6 m^2/s from 0.4 to 0.9 m^2/s
d is 480 ± 20 kg m^2 ± 1 %
z is 0.7 ± 8 % at 3 sigma
A, k are positive
q has unit m/s
tune Kp from 1 to 20 m^2/s
unit pulse is 1.2 mrad
points low, high   # pond states
  m is 12, 30 kg ± 2 %
  n is 1, 2

C = Kp + Ki/s          # the controller

loop gate driven by w, r
  A h' = w - C (r - h) # outflow
  e = r - h
  uses stage as x

  u = k (h - x.y)'
case storm of gate
  w = step(2 m^3/s) after 5 s + 2 ramp(R) - noise(Sw)
  # a comment alone
  h starts at 3 mm
  h' starts at 1 mm/s
\`\`\`

> A quoted cell:
> ~~~loop
> e_ss = final(storm.e)
>    in mm
> gate(w -> e, h)
> ~~~

- in a list
  \`\`\`loop
  x = rows(1, 2 | 3,
    4)
  require abs(e_ss) <= 2 mm and stable(gate) # R-1
  \`\`\`

$$
a
- b
$$

\`\`\`loop
require density(storm.e, f) <= 1e-8 m^2/Hz for f from 5 Hz to 200 Hz
draw region of Kp, Ki where stable(gate), gain_margin(C) >= 6 dB titled "gains"
draw response of storm.e over 20 s
tabulate e_ss for Kp is 1, 2, 3 m^2/s
tabulate e_ss for Kp from 1 to 2, 12 steps
explain e_ss with (Kp is 2 m^2/s, Ki is 0)
limit(s C as s to 0)
broken = (1 +
fine = 2 [m] theta_0^-2
\`\`\`
`;
