/** What Pyodide is told of its engine: nothing, it imports the module that lies beside it. The one-file edition brings it. */
export const ENGINE = {};
