/** Why numbers with an imaginary part are refused, in one sentence for every place. */
export const complexRefusal = 'Complex coefficients are not covered: a loop in rotating coordinates, or with forward and backward whirl, needs negative frequencies too. Write it in real coordinates, with conjugate pairs.'
