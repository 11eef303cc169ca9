/** How many events one request may carry. Apart from the schemas, so that a player carries no parser. */
export const EVENTS_PER_REQUEST = 500
