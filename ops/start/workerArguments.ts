/**
 * Node's arguments for the worker. Recomputing makes hundreds of megabytes that are soon forgotten: with more room for young objects
 * most have died before the first look at them. It takes a sixth less time and some 25 MiB more memory (`ops/bench/README.md`).
 */
export const WORKER_ARGUMENTS = ['--max-semi-space-size=64', '--import', 'tsx'];
