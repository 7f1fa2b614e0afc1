/** Version of the engine: raised whenever a golden result changes; a test holds it against the hash of the golden results. */
export const ENGINE_VERSION = '0.2.0'
