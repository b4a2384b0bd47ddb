/** Where the benchmarks listen, one after the other. */
export const PORTS = { wordkeep: 4370, bare: 4371, emptyPage: 4372 };
