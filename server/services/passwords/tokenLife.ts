/** How long the links sent by mail are good for; ms. */
export const tokenLife = { invitation: 7 * 24 * 3600 * 1000, reset: 3600 * 1000 }
