/** One seed for all simulated figures, so that each comes out the same on every machine and every day. */
export const fixedSeed = 20_260_101;
