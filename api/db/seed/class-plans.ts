import { cancelFactors, sumOfFractions } from './tasks/fractions.ts';
import { equationWithHalves, inequality, quadraticByFactors, rootEquation } from './tasks/equations.ts';
import {
  lettersOnBothSides,
  minusBeforeBracket,
  minusTwoBrackets,
  squaresThatVanish,
  thirdsAndHalves,
  twoBrackets,
} from './tasks/first-year.ts';
import { productTakenAway, slopeOfProduct, squareAndProduct } from './tasks/products.ts';
import { day, type RoundPlan } from './round-plan.ts';

/** Tasks that wait in their teachers' collections. */
export const SPARE_TASKS_10C = [productTakenAway];
export const SPARE_TASKS_9A = [twoBrackets];

/** Class 10C: three rounds settled, and one in every other stage. */
export const ROUNDS_10C: readonly RoundPlan[] = [
  {
    task: sumOfFractions,
    times: [day(-35, 8), day(-32, 20), day(-29, 20), day(-27, 20), day(-26, 18)],
    excused: ['Hana Mizukoshi'],
    writes: { 'Rafael Quintanilha': 6 },
    stubborn: {
      'Rafael Quintanilha': 'x + 2 is on top and below, and so is x - 1. What is the same may be cancelled.',
    },
    ruled: true,
  },
  {
    task: equationWithHalves,
    times: [day(-25, 8), day(-22, 20), day(-19, 20), day(-17, 20), day(-16, 18)],
    absent: ['Finnian Corrigall'],
    ruled: true,
  },
  {
    task: quadraticByFactors,
    times: [day(-12, 8), day(-10, 20), day(-7, 20), day(-5, 20), day(-4, 18)],
    writes: { 'Amelie Rouvray': 2, 'Tomasz Wierzba': 7, 'Oskar Lindqvell': 6, 'Noor Haddadin': 3, 'Kwabena Dartey': 1 },
    ruled: true,
    noMend: ['Amelie Rouvray', 'Noor Haddadin', 'Tomasz Wierzba'],
    contestsVerdict: {
      name: 'Oskar Lindqvell',
      words: 'With 7 on the right I tried 7 times 1, and x = 7 comes out. So the step did lead to a solution.',
    },
  },
  {
    task: rootEquation,
    times: [day(-10, 8), day(-7, 20), day(-4, 20), day(-2, 20), day(-1, 17)],
    writes: { 'Saskia Overbeek': 6, 'Deniz Karahan': 2, 'Priya Anantharam': 4 },
    stubborn: {
      'Deniz Karahan':
        'The task says to solve, and both come out of the quadratic. I did not think that I had to test.',
    },
  },
  {
    task: cancelFactors,
    times: [day(-6, 8), day(-4, 20), day(-1, 18), day(1, 20), day(2, 18)],
    writes: { 'Tomasz Wierzba': 3, 'Mateo Larrondo': 2 },
    silent: ['Tomasz Wierzba', 'Noor Haddadin', 'Yael Rosenthaler', 'Finnian Corrigall', 'Vy Truong'],
    stubborn: { 'Mateo Larrondo': 'x squared is on top and below, so it goes. We always cancel what is the same.' },
  },
  {
    task: squareAndProduct,
    times: [day(-4, 8), day(-1, 20), day(1, 18), day(3, 20), day(4, 18)],
    lateRule: 'late-batch',
    absent: ['Finnian Corrigall'],
    excused: ['Yael Rosenthaler'],
    idle: ['Noor Haddadin', 'Oskar Lindqvell', 'Mateo Larrondo'],
    writes: { 'Tomasz Wierzba': 2, 'Amelie Rouvray': 5 },
  },
  {
    task: inequality,
    times: [day(-1, 8), day(1, 20), day(4, 20), day(6, 20), day(7, 18)],
    atWork: [
      { name: 'Kwabena Dartey', sheet: 1 },
      { name: 'Vy Truong', sheet: 0 },
      { name: 'Hana Mizukoshi', sheet: 0 },
      { name: 'Rafael Quintanilha', sheet: 3 },
      { name: 'Tomasz Wierzba', sheet: 2, lineAgo: 24, savedAgo: 4 },
      { name: 'Finnian Corrigall', sheet: 6, lineAgo: 31, savedAgo: 2 },
      { name: 'Deniz Karahan', sheet: 7, lineAgo: 19, savedAgo: 6 },
      { name: 'Saskia Overbeek', sheet: 5, lineAgo: 3, savedAgo: 1 },
      { name: 'Priya Anantharam', sheet: 0, lineAgo: 190, savedAgo: 184 },
      { name: 'Oskar Lindqvell', sheet: 4, lineAgo: 65, savedAgo: 63 },
      { name: 'Amelie Rouvray', sheet: 6, lineAgo: 7, savedAgo: 5 },
    ],
  },
  {
    task: slopeOfProduct,
    times: [day(3, 8), day(6, 20), day(9, 20), day(11, 20), day(12, 18)],
  },
];

/** Class 9A: two rounds settled, one each in reviewing and writing, one planned. */
export const ROUNDS_9A: readonly RoundPlan[] = [
  {
    task: squaresThatVanish,
    absent: ['Callum Strathairn'],
    times: [day(-22, 9), day(-19, 19), day(-16, 19), day(-14, 19), day(-13, 17)],
    stubborn: { 'Luca Bertagnoli': 'First times first and last times last is what we did in the lesson.' },
    writes: { 'Luca Bertagnoli': 2 },
    ruled: true,
  },
  {
    task: minusBeforeBracket,
    times: [day(-11, 9), day(-8, 19), day(-6, 19), day(-4, 19), day(-3, 17)],
    writes: { 'Zofia Malkowicz': 2 },
    ruled: true,
    noMend: ['Zofia Malkowicz'],
  },
  {
    task: thirdsAndHalves,
    times: [day(-4, 9), day(-1, 19), day(2, 19), day(4, 19), day(5, 17)],
    idle: ['Zofia Malkowicz', 'Luca Bertagnoli'],
    extended: { name: 'Aroha Tepania', until: day(1, 19), reason: 'Ill on Thursday and Friday' },
  },
  {
    task: minusTwoBrackets,
    times: [day(-1, 9), day(3, 19), day(6, 19), day(8, 19), day(9, 17)],
    atWork: [
      { name: 'Meixin Laoshi', sheet: 1, lineAgo: 12, savedAgo: 12 },
      { name: 'Viktor Radoslavin', sheet: 2, lineAgo: 9, savedAgo: 2 },
    ],
  },
  {
    task: lettersOnBothSides,
    times: [day(5, 9), day(8, 19), day(11, 19), day(13, 19), day(14, 17)],
  },
];
