/** Written into every answer; raised whenever a bit of any answer may change. */
export const ENGINE_VERSION = '1.2.2';
