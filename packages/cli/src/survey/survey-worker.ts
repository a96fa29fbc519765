import { parentPort, workerData } from 'node:worker_threads';
import { UNWATCHED } from '@slewcurve/job';
import { surveyOne, type SurveyWork } from './survey-one.js';

// A thread of the pool: gets a file's name, answers with its report, one after the other.
const work: SurveyWork = workerData;
parentPort?.on('message', (name: string) => {
  void surveyOne(name, work, UNWATCHED).then((report) => parentPort?.postMessage(report));
});
