/** How long a session lives without a request, and at most; ms. */
export const sessionLife = { idle: 60 * 60 * 1000, absolute: 12 * 60 * 60 * 1000 }
