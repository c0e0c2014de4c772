// The limits on what is read, in one place. Beyond them a file is refused with a message, never with a crash. They are far
// above what a case needs and low enough that a hostile file is refused soon.

/** Largest case file in bytes. */
export const LARGEST_FILE = 1_048_576;
/** Deepest nesting of maps and lists in a case file; a case needs six. */
export const DEEPEST_YAML = 50;
/** Longest identifier or name, in characters. */
export const LONGEST_NAME = 40;
/** Longest title, in characters. */
export const LONGEST_TITLE = 500;
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
/** Largest exponent of fields and operators, after powers of powers are multiplied out. */
export const HIGHEST_POWER = 24;
/** Longest step of a shift, and highest order of a derivative, along one axis. */
export const LONGEST_REACH = 64;
/** Largest exponent of numbers and parameters. */
export const HIGHEST_CONSTANT_POWER = 1000;
/** Numbers that arithmetic on constants produces stay below two to this power; one that is read has 10,000 digits at most. */
export const LONGEST_NUMBER_BITS = 40_000;
/** Most terms of one coefficient. */
export const MOST_COEFFICIENT_TERMS = 200;
/** Most terms of one operator. */
export const MOST_OPERATOR_TERMS = 1000;
/** Most parts of one expression, after operators on products are written out. */
export const MOST_EXPRESSION_PARTS = 5000;
