/** Version of the engine; it changes whenever a number that it gives could change. Stored with every result. */
export const ENGINE_VERSION = '1.0.1'
