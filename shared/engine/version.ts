/** Version of the engine: stands in every evaluation and as origin of every proposed field. Raise it when a result changes. */
export const ENGINE_VERSION = '0.1.0'
