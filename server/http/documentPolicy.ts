/** Policy of a report shown in place: it uses what it carries inside itself, runs nothing, submits nothing, and stands only in our own pages. */
export const documentPolicy = 'default-src \'none\'; style-src \'unsafe-inline\'; img-src data:; font-src data:; form-action \'none\'; base-uri \'none\'; frame-ancestors \'self\'; sandbox'
