/** In the one-file edition the engine's module is in the worker's own text: nothing is left to import. */
import createPyodideModule from "../runtime/pyodide.asm.mjs";

export const ENGINE = { createPyodideModule };
