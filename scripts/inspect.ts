import { runAsProgram } from './headless';
import { inspectCommand } from './inspect/command';

void runAsProgram(inspectCommand);
