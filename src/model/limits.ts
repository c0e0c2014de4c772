// The limits on what is read, in one place. Beyond them a file is refused with a message, never with a crash.

/** Largest case file in bytes. */
export const LARGEST_FILE = 1_048_576;
/** Deepest nesting of maps and lists in a case file. */
export const DEEPEST_YAML = 50;
/** Most axes: 1 to 4 space-time dimensions. */
export const MOST_AXES = 4;
export const MOST_FIELDS = 8;
export const MOST_PARAMETERS = 60;
export const MOST_TERMS = 60;
export const MOST_CLAIMS = 200;
/** Highest order beyond the leading one that may be asked for. */
export const HIGHEST_ORDER = 16;
/** Largest number of field factors that may be asked for. */
export const MOST_FIELD_FACTORS = 16;
