/** What the exit code of every command says. */
export const exitCodes = {
  done: 0,
  /** a fault of Looptally itself */
  fault: 1,
  badInput: 2,
  notClosed: 3,
  aimNotReached: 4,
  /** 128 and the number of the signal, as shells have it: SIGINT (Ctrl-C), SIGTERM */
  interrupted: 130,
  terminated: 143,
} as const;
