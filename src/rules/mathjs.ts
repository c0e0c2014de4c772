// The only use of mathjs in this room: its parser for the boolean conditions of rules. Nothing is ever evaluated by it.

export { parse } from 'mathjs/number';
