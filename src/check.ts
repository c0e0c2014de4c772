// The one function that walks the whole way: case → expansion → matching → symmetries → rough configurations → witnesses
// → claims → findings. It orders the analyses and decides nothing itself.

import { judgeClaim } from './claims/judge.ts';
import { expandAction, type Expansion } from './limit/expansion.ts';
import { Density } from './limit/jets.ts';
import { matchProposal, type Matching, proposalDensity, proposeContinuum } from './limit/matching.ts';
import { isEquivalent, normalForm } from './limit/normalForm.ts';
import { printDensity } from './limit/printDensity.ts';
import { type QuadraticSign, quadraticSign } from './limit/quadraticForm.ts';
import { type LinearForm } from './model/action.ts';
import type { Case, Proposal } from './model/case.ts';
import type { CheckReport } from './report/findings.ts';
import { applyRules } from './rules/evaluate.ts';
import type { Analyses, Verdict } from './rules/facts.ts';
import type { Rule } from './rules/load.ts';
import type { ShiftAnalysis } from './symmetry/family.ts';
import { forbiddingSymmetry } from './symmetry/forbidden.ts';
import { analysePointGroup, type PointGroupAnalysis } from './symmetry/pointGroup.ts';
import { transformDensity } from './symmetry/continuumElement.ts';
import { analyseShifts } from './symmetry/shifts.ts';
