// A case to start from.

/** A commented case with the given identifier; `readCase` accepts it. */
export function starterCase(name: string): string {
  return `# Change what is written here into your model, then: saltus check ${name}.yaml
case: ${name}
title: Rotors on a square lattice
lattice:
  axes:                                 # 1 to 4; their order fixes the order of coordinates
    tau: {spacing: b, role: time}       # imaginary time, with its own spacing
    x:   {spacing: a}
    y:   {spacing: a}                   # axes may share a spacing
fields:
  phi: {values: angle}                  # angle (period 2 pi) or real
parameters:
  J0: {positive: true}                  # leave positive out where the sign is not known
  J:  {positive: true}
parent:
  action:                               # summed over cells; Delta, Deltab, Deltac, T are undivided
    - {name: time-link, term: "J0*(1 - cos(Delta_tau phi))"}
    - {name: x-link, term: "J*(1 - cos(Delta_x phi))"}
    - {name: y-link, term: "J*(1 - cos(Delta_y phi))"}
  compactness: cosine
proposal:                               # leave it out and one is proposed
  parameters: {K0: {positive: true}, K: {positive: true}}
  lagrangian: "K0/2 (d_tau phi)^2 + K/2 ((d_x phi)^2 + (d_y phi)^2)"
  matching: {K0: "J0*b/a^2", K: "J/b"}  # leave it out and it is solved
expand: {beyond-leading: 4}             # orders in the spacings beyond the leading one
claims:                                 # survives, continuum-only, lattice-only or absent
  - {id: charge, shift: "1", status: survives}
  - {id: not-line-by-line, shift: "f(x)", status: absent}
  - {id: quarter-turn, point-group: {order: 8}, status: survives}
  - {id: wall, configuration: "theta(x)", suppressed: {continuum: yes, lattice: yes}}
  - {id: artefacts, corrections: {begin: 2}}
  - {id: charges, count: "1", group: U(1)}
`;
}
