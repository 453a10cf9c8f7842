/** Before every route of the api. */
export const API_PREFIX = 'api/v1';
