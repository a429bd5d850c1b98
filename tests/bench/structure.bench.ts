/*
 * How long structure takes, certificates included. Prints the median of several runs in one process after one that warms
 * up, and the first run, which is what a fresh worker sees. `--peers` sets the rank beside LinBox's sparse elimination on
 * the same matrices (C++, built here; needs g++, and Debian's liblinbox-dev and libntl-dev).
 */
import { readFileSync } from 'node:fs';
import { analyseStructure } from '@stillroom/kernel/cells';
import { leftKernel, modularRanks } from '@stillroom/kernel/exact';
import { oneArrowOfEachPair, stoichiometry, structuralNetwork } from '@stillroom/kernel/network';
import {
  conservative,
  consistent,
  figures,
  linkageClasses,
  ranksOfClasses,
  spanningForest,
} from '@stillroom/kernel/structure';
import { judgeAll } from '@stillroom/kernel/theorems';
import type { Network } from '@stillroom/shared/network';
import { readNetwork } from '@stillroom/shared/notation';
import { referenceNetwork, referenceNetworks } from '../support/reference-networks.ts';
import { latticeText, randomNetworkText } from './networks.ts';
import { linboxRank } from './peers/linbox.ts';

/** One line of the printed table; processor times in milliseconds. */
export interface Row {
  readonly what: string;
  readonly first: number;
  readonly median: number;
  readonly target: string;
  readonly remark: string;
}

interface Case {
  readonly what: string;
  readonly text: () => string;
  readonly runs: number;
  /** Limit in milliseconds, and whether reading the text counts. */
  readonly limit: number;
  readonly withReading: boolean;
}

const cases: readonly Case[] = [
  {
    what: 'random, 10,000 species × 20,000 reactions, 1–2 molecules a side',
    text: () => randomNetworkText(10_000, 20_000, 0.5),
    runs: 7,
    limit: 300,
    withReading: false,
  },
  {
    what: 'random, 10,000 × 20,000, all bimolecular',
    text: () => randomNetworkText(10_000, 20_000, 1),
    runs: 5,
    limit: 1000,
    withReading: false,
  },
  {
    what: 'lattice 300 × 300, 360,000 hops',
    text: () => latticeText(300),
    runs: 5,
    limit: 500,
    withReading: true,
  },
  {
    what: 'lattice 1000 × 1000, 4,000,000 hops',
    text: () => latticeText(1000),
    runs: 3,
    limit: 5000,
    withReading: true,
  },
];

/** LinBox takes minutes for larger bimolecular networks. */
const sideBySide: readonly Pick<Case, 'what' | 'text'>[] = [
  {
    what: 'random, 10,000 × 20,000, 1–2 molecules a side',
    text: () => randomNetworkText(10_000, 20_000, 0.5),
  },
  { what: 'random, 2,000 × 4,000, all bimolecular', text: () => randomNetworkText(2000, 4000, 1) },
];

/** Measures every case and, where asked, the peer. */
export async function run(peers: boolean): Promise<Row[]> {
  // First, so that nothing is warm.
  const rows: Row[] = measureVerdicts();
  for (const each of cases) rows.push(measureCase(each));
  rows.push(measureWhole());
  if (peers) {
    for (const { what, text } of sideBySide) rows.push(...(await measurePeer(what, read(text()))));
  }
  return rows;
}

/** All of section 1 but siphons and verdicts. */
function structureWithoutSiphons(network: Network): string {
  const structural = structuralNetwork(network);
  const found = figures(structural);
  if (found.laws === null || found.rank === null) throw new Error('the rank was not proven');
  ranksOfClasses(structural, linkageClasses(structural), spanningForest(structural), found.rank);
  const conserved = conservative(found.laws, structural.species.length).holds;
  const balanced = consistent(structural, found.strong);
  return `rank ${found.rank}, deficiency ${found.deficiency}, ${found.laws.basis.length} laws, conservative ${conserved}, consistent ${balanced}`;
}

function measureCase({ what, text, runs, limit, withReading }: Case): Row {
  const written = text();
  const kept = withReading ? null : read(written);
  let remark = '';
  const times = measure(runs, () => {
    remark = structureWithoutSiphons(kept ?? read(written));
  });
  const peak = Math.round(process.resourceUsage().maxRSS / 1024);
  return {
    what: `${what}${withReading ? ', from the text' : ', after reading'}`,
    ...times,
    target: `target ${limit} ms: ${times.first <= limit ? 'met' : 'NOT MET'}`,
    remark: `${remark}; peak so far ${peak} MB`,
  };
}

/** A whole structure cell, verdicts and lists included, on a network of 10^5 reactions. */
function measureWhole(): Row {
  const network = read(randomNetworkText(50_000, 100_000, 0.5));
  let remark = '';
  const times = measure(3, () => {
    const { counts, siphons, verdicts } = analyseStructure(network);
    remark = `rank ${counts.rank}, ${siphons.length} siphons, ${verdicts.length} verdicts`;
  });
  return { what: 'whole structure cell, 100,000 reactions', ...times, target: 'no target', remark };
}

/** All verdicts, structure included, each network once in this process. */
function measureVerdicts(): Row[] {
  const shares = [0.5, 0.6, 0.7, 0.8, 0.9, 1];
  const random = shares.map((bimolecular, k) => read(randomNetworkText(30, 60, bimolecular, k + 1)));
  const line = (what: string, networks: readonly Network[], limit: number, by: 'longest' | 'median'): Row => {
    const times = networks.map((network) => timed(() => judgeAll(network)));
    const longest = Math.max(...times);
    const reached = by === 'longest' ? longest : median(times);
    return {
      what,
      first: times[0]!,
      median: median(times),
      target: `target ${limit} ms for the ${by}: ${reached <= limit ? 'met' : 'NOT MET'}`,
      remark: `${networks.length} networks, longest ${longest.toFixed(0)} ms`,
    };
  };
  return [
    line('all verdicts, random, 30 species × 60 reactions', random, 500, 'longest'),
    line('all verdicts, reference table', referenceNetworks.map(referenceNetwork), 100, 'median'),
  ];
}

async function measurePeer(what: string, network: Network): Promise<Row[]> {
  const structural = structuralNetwork(network);
  const { matrix } = stoichiometry(structural, oneArrowOfEachPair(structural));
  const rounds = 5;
  const theirs: number[] = [];
  const modular: number[] = [];
  const certified: number[] = [];
  let rank = 0;
  for (let warming = 0; warming < 5; warming++) leftKernel(matrix);
  for (let round = 0; round < rounds; round++) {
    const peer = await linboxRank(matrix);
    theirs.push(peer.milliseconds);
    modular.push(timed(() => modularRanks(matrix, new Int32Array(matrix.columnCount), 1)));
    certified.push(timed(() => (rank = leftKernel(matrix)?.rank ?? -1)));
    if (rank !== peer.rank) throw new Error(`rank ${rank}, LinBox says ${peer.rank}`);
  }
  const ratio = (own: number[]) => (median(theirs) / median(own)).toFixed(1);
  const line = (name: string, own: number[], least: number): Row => ({
    what: `${what}: ${name}`,
    first: own[0]!,
    median: median(own),
    target: `target ${least} times as fast: ${median(theirs) >= least * median(own) ? 'met' : 'NOT MET'}`,
    remark: `LinBox ${median(theirs).toFixed(0)} ms (side by side, ${rounds} rounds): ${ratio(own)} times`,
  });
  return [line('rank modulo p', modular, 20), line('rank proven, laws', certified, 3)];
}

function read(text: string): Network {
  const { network, complaints } = readNetwork(text);
  if (network === null) throw new Error(complaints[0]?.message ?? 'the text could not be read');
  return network;
}

function measure(runs: number, work: () => void): { first: number; median: number } {
  const first = timed(work);
  return { first, median: median(Array.from({ length: runs }, () => timed(work))) };
}

/**
 * Time that the processor gave to this thread, in milliseconds: what the work takes on a machine that does nothing else.
 * Other programs do not count, nor do compiling and clearing up beside it.
 */
function timed(work: () => void): number {
  const start = threadTime();
  work();
  return threadTime() - start;
}

const threadTime = (): number =>
  Number(readFileSync('/proc/thread-self/schedstat', 'utf8').split(' ')[0]) / 1e6;

function median(times: readonly number[]): number {
  return [...times].sort((a, b) => a - b)[times.length >> 1]!;
}

const rows = await run(process.argv.includes('--peers'));
for (const { what, first, median: middle, target, remark } of rows) {
  console.log(
    `${what}\n    first ${first.toFixed(0)} ms, median ${middle.toFixed(0)} ms (${target})   ${remark}`,
  );
}
