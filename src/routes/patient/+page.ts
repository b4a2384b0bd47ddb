/** This page has a script of its own (main.ts): the framework's would be half of what a tablet has to load. */
export const csr = false;
