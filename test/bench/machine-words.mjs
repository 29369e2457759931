import { cpus } from 'node:os';

/** What the numbers of a table were taken on. */
export const machineWords = () => `${cpus().length} x ${cpus()[0].model.trim()}, Node ${process.versions.node}`;
