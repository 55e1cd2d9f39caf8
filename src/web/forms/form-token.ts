/** Name of the hidden field that shows a form to come from our own page. */
export const formTokenField = 'formToken';
