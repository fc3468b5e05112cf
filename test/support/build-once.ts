import { execFileSync } from 'node:child_process';

/** Tests that run the command line as a child process use the built package: build it once before any test. */
export default function setup(): void {
  try {
    execFileSync(process.execPath, ['node_modules/typescript/bin/tsc', '-p', 'tsconfig.build.json'], {
      stdio: 'pipe',
    });
  } catch {
    console.error('build failed');
  }
}
