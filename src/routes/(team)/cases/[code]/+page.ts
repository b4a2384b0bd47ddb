/** The page holds this device's own entries, which the server does not have. */
export const ssr = false;
