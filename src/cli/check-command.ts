// Owns `guidewall check`: what a run of a job would be, in words, without running it.
// Must not know how plans are made.
import { formatQuantity } from '../base/quantity.ts';
import { NOMINAL_SPEED, makePlan } from '../engine/plan.ts';
import type { Estimate } from '../engine/estimate.ts';
import { describeSection } from '../model/describe-section.ts';
import type { Job } from '../model/job.ts';
import { wantsReference } from '../model/reference.ts';
import { materialRemarks, referenceRemarks } from '../model/remarks.ts';
import { resolveJob } from '../model/resolve-job.ts';
import { EXIT } from './exit-code.ts';
import type { ExitCode } from './exit-code.ts';
import { duration } from './progress-line.ts';
import { readJobFile, refuse } from './read-job-file.ts';

export async function checkCommand({ jobFile }: { jobFile: string }): Promise<ExitCode> {
  const job = await readJobFile(jobFile);
  if (!job.ok) return refuse(jobFile, job.errors);
  const resolved = resolveJob(job.value);
  if (!resolved.ok) return refuse(jobFile, resolved.errors);
  // The whole plan, not the estimate alone: it refuses everything a run would refuse.
  const plan = makePlan(resolved.value, 'main');
  if (!plan.ok) return refuse(jobFile, plan.errors);
  console.log(describeJob(job.value, plan.value.estimate).join('\n'));
  return EXIT.done;
}

/** The lines `check` prints: what the section stands for, grid, step, memory, time, remarks. */
export function describeJob(job: Job, estimate: Estimate): string[] {
  const { cellsX, cellsY, cellsTotal, dxMetres, dyMetres, dtSeconds, stepLimit } = estimate;
  const reference = wantsReference(job) ? '; the reference run takes as long again' : '';
  return [
    job.title === '' ? 'Untitled job' : job.title,
    describeSection(job),
    '',
    `grid        ${cellsX} x ${cellsY} cells on the sheet, ${cellsTotal} with its absorbers; ${formatQuantity(dxMetres, 'length', 4)} x ${formatQuantity(dyMetres, 'length', 4)}`,
    `resolution  ${estimate.cellsPerShortestWavelength.toFixed(1)} cells per shortest wavelength; phase error ${estimate.phaseErrorDegrees.toFixed(2)} deg per wavelength`,
    `time step   ${formatQuantity(dtSeconds, 'time', 4)}, at most ${stepLimit} steps (${formatQuantity(stepLimit * dtSeconds, 'time', 4)})`,
    `memory      ${(estimate.memoryBytes / 1e6).toFixed(1)} MB`,
    `run time    ${duration(estimate.secondsAtMost)} at most at ${NOMINAL_SPEED} Mcell/s${reference}`,
    ...(estimate.launch === null ? [] : [`plane wave  ${estimate.launch}`]),
    ...[...estimate.remarks, ...materialRemarks(job), ...referenceRemarks(job)].map(
      ({ path, message }) => `remark      ${path === undefined ? '' : `${path}: `}${message}`,
    ),
    '',
    'The job can be run.',
  ];
}
