import { execFileSync } from 'node:child_process';

/** Tests that run the command line as a child process use the built package: build it once before any test. */
export default function setup(): void {
  execFileSync(process.execPath, ['node_modules/typescript/bin/tsc', '-p', 'tsconfig.build.json'], {
    stdio: 'inherit',
  });
}
