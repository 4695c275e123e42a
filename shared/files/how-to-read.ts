/** How the words are meant, for whoever loads them: scales, directions and signs. In the head of every file of words. */
export const howToRead: readonly string[] = [
  'Gain: mantissa · 2^−shift, the product rounded once; a shift above 0 goes to the right, one below 0 to the left.',
  'Proportional gain: output LSB per error LSB; the output is the NCO’s or the counter’s.',
  'Integral gain: integrator LSB per error LSB; the guard bits of the integrator lie below one output LSB, those of ' +
    'the second integrator below one LSB of the first.',
  'Output: proportional path + (integrator >> guard bits).',
  'Error: one LSB is 2^(full scale log2 − (error bits − 1)) detector units; above 0 when the input leads or the ' +
    'strobe is early.',
  'Carrier: the NCO steps by its frequency control word + output, and samples are turned back by its phase.',
  'Clock: the counter steps down by its nominal step − output, so a larger output strobes later.',
  'Polarity: the signs of the mantissas carry it already; negate nothing twice.',
];
