// Which names may be used where: the action has the parameters of the parent, the Lagrangian those of the proposal, and the
// matching expresses the second by the first.

import type { Declarations } from './declarations.ts';
import type { Parameter } from './geometry.ts';
import type { Names } from './names.ts';

/** Names for each place in which an expression may stand. */
export interface Scopes {
  /** Terms of the action. */
  readonly lattice: Names;
  /** The Lagrangian of the proposal. */
  readonly continuum: Names;
  /** Matching and rescaling. */
  readonly matching: Names;
  /** Dual values of the proposal's parameters. */
  readonly duality: Names;
}

export function scopes({ lattice, fields, parameters, proposalParameters, expand }: Declarations): Scopes {
  const common = {
    axes: lattice.axes.map((x) => x.name),
    fields: fields.map((f) => f.name),
    background: expand.background,
  };
  const withConstants = (
    own: readonly Parameter[],
    spacings: readonly string[],
  ): Pick<Names, 'constants' | 'positive'> => ({
    constants: new Set([...own.map((p) => p.name), ...spacings]),
    positive: new Set([...own.filter((p) => p.positive).map((p) => p.name), ...spacings]),
  });
  const explained = (others: readonly Parameter[], owner: string, mend: string): Names['elsewhere'] =>
    new Map(others.map(({ name }) => [name, { problem: `"${name}" is a parameter of the ${owner}`, mend }]));
  const proposal = 'proposal: parameters';
  return {
    lattice: {
      ...common,
      ...withConstants(parameters, lattice.limits),
      elsewhere: explained(
        proposalParameters,
        'proposal, not of the action',
        'use a parameter that is declared under parameters',
      ),
      declareUnder: 'parameters',
    },
    continuum: {
      ...common,
      ...withConstants(proposalParameters, lattice.limits),
      elsewhere: explained(
        parameters,
        'parent, not of the proposal',
        `declare a parameter under ${proposal} and relate the two under proposal: matching`,
      ),
      declareUnder: proposal,
    },
    matching: {
      ...common,
      ...withConstants(parameters, lattice.limits),
      elsewhere: explained(
        proposalParameters,
        'proposal itself',
        'express it by parameters of the parent and spacings',
      ),
      declareUnder: 'parameters',
    },
    duality: {
      ...common,
      ...withConstants(proposalParameters, []),
      elsewhere: explained(
        parameters,
        'parent',
        'a duality maps the parameters of the proposal; express it by those',
      ),
      declareUnder: proposal,
    },
  };
}
