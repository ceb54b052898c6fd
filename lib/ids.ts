const ID = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/;

/** Whether a text from an address can be the id of a row at all; anything else is unknown without asking the store. */
export const isId = (text: string): boolean => ID.test(text);
