/** The engine's version, written beside every stored figure so that it can be recomputed (rule R23). */
export const ENGINE_VERSION = '4'
