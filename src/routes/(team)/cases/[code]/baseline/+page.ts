/** A live screen has nothing to show before its log is folded in the browser. */
export const ssr = false;
