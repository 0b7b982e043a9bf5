import { fitCommand } from './fit/command';
import { runAsProgram } from './headless';

void runAsProgram(fitCommand);
