/** Times the lattice method inside a browser worker. Receives the numbers as hexadecimal text, answers with milliseconds. */
import { startLattice } from '../../src/relation/lattice/index.ts';

interface Question {
  readonly numbers: readonly string[];
  readonly runs: number;
}

interface Answer {
  readonly milliseconds: number[];
  readonly longestStep: number;
  readonly candidate: readonly string[] | undefined;
  readonly kernels: string;
}

function answer({ numbers, runs }: Question): Answer {
  const integers = numbers.map((text) => [text.startsWith('-') ? -BigInt(`0x${text.slice(1)}`) : BigInt(`0x${text}`)]);
  const milliseconds: number[] = [];
  let longestStep = 0;
  let candidate: readonly string[] | undefined;
  let kernels = '';
  for (let k = 0; k < runs; k++) {
    const begin = performance.now();
    const run = startLattice({ integers });
    for (;;) {
      const before = performance.now();
      const result = run.step();
      longestStep = Math.max(longestStep, performance.now() - before);
      if (result === undefined) continue;
      candidate = result.candidate?.map(String);
      break;
    }
    milliseconds.push(performance.now() - begin);
    kernels = run.kernels;
  }
  return { milliseconds, longestStep, candidate, kernels };
}

const scope = globalThis as unknown as {
  onmessage: (event: { data: Question }) => void;
  postMessage(data: Answer): void;
};
scope.onmessage = (event) => scope.postMessage(answer(event.data));
