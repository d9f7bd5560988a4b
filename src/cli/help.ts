// Owns what `--help` says.
// Must not know how the words of a command line are read.

export type HelpTopic = 'general' | 'run' | 'check' | 'speed';

export const HELP: Readonly<Record<HelpTopic, string>> = {
  general: `Guidewall computes electromagnetic waves in a two-dimensional section.

  guidewall run JOB.json --out DIR    run the job and its reference, write the numbers
  guidewall check JOB.json            read the job, say what a run would take, run nothing
  guidewall speed                     measure how fast this machine steps

Each command has its own --help. Job files are saved by the bench in the browser (npm start), or written by hand.
Exit code: 0 done; 1 the command line or the job is wrong; 2 the run failed; 130 stopped by Ctrl-C.`,

  run: `guidewall run JOB.json [--out DIR] [--threads N] [--quiet]

Runs the job, then its reference run where the job asks for one, and writes into DIR:

  time-series.csv   every probe and component against time, V/m or A/m
  spectrum.csv      every probe and component as real and imaginary part, the reference run's beside it, and their ratio H
  summary.json      grid, time step, time, energy left, memory, throughput, and each probe's H at the listed frequencies

  --out DIR   folder for the files, made if missing; files of these names in it are replaced
              (default: JOB-results in the current folder)
  --threads N threads that work on a run: 1 to 8 (default: the cores there are); the numbers do not depend on it
  --quiet     no progress
  --help      this text

Fields are peak values with exp(+jwt). Progress goes to the error stream: a bar on a terminal, plain lines elsewhere.
Ctrl-C stops after the present step and writes what there is, marked as stopped; a second Ctrl-C ends at once.
Exit code: 0 done; 1 the command line or the job is wrong; 2 the run failed; 130 stopped by Ctrl-C.`,

  check: `guidewall check JOB.json

Reads the job as a run would and prints what it stands for, the grid, the time step, the memory and the time it takes at
most, and remarks. Runs nothing.

  --help   this text

Exit code: 0 the job can be run; 1 it cannot: each error names the place in the job, the value and the mend.`,

  speed: `guidewall speed [--cells N] [--seconds S] [--threads N]

Steps empty square sheets with absorbing edges, one line current and one probe, and prints million cell updates a second.

  --cells N     cells along each side, absorbers included: 64 to 8192 (default: several sizes, on one thread and on all)
  --seconds S   time to measure each for: 0.1 to 600 (default 1)
  --threads N   threads that work on it: 1 to 8 (default: the cores there are)
  --help        this text`,
};
