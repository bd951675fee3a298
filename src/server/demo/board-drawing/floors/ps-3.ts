import { at } from '../geometry';
import { polygon, rounded, type Floor } from './floor';

export const PS_3: Floor = {
  seed: 1,
  width: 150,
  height: 88,
  outline: rounded(polygon(0, 0, 150, 0, 150, 88, 0, 88), 1.2),
  slots: [[at(24, 3), at(24, 22), 2]],
  screws: [at(5, 5), at(145, 5), at(5, 83), at(145, 83)],
  jacks: [],
  wires: [
    {
      ref: 'J1',
      at: at(13, 10),
      turn: 180,
      ends: [
        { net: 'AC1', colour: '#6b3a1f' },
        { net: 'AC2', colour: '#2a5fb0' },
      ],
    },
    {
      ref: 'J2',
      at: at(140, 62),
      turn: 0,
      ends: [
        { net: 'OUT', colour: '#b3201f' },
        { net: 'SENSE', colour: '#1d1d20' },
      ],
    },
  ],
  fixed: { Q1: { at: at(98, 15), turn: 0 }, C1: { at: at(46, 56), turn: 0 } },
  wafer: null,
  brain: null,
  display: null,
  ground: '0V',
  groundFrom: 200,
  mask: { bare: '#b58a4c', copper: '#b58a4c', edge: '#8a6a3a', silk: '#e4e0d2' },
  backMask: { bare: '#3f5a2a', copper: '#57783a', edge: '#8a6a3a', silk: '#e4e0d2' },
  plainFront: true,
  through: true,
  bench: 'slate',
  discs: { mov: '#1c4a8b', ptc: '#3f4148' },
  print: { at: at(118, 84), lines: ['OSTREL PS-3'] },
};
