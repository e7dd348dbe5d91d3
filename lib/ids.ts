const uuid = /^[0-9a-f]{8}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{4}-[0-9a-f]{12}$/i;

/** Whether a text from outside can be an id of ours; asking PostgreSQL with anything else is an error, not a miss. */
export const isId = (text: string): boolean => uuid.test(text);
