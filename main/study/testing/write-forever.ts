import { writeAtomically } from '../write-atomically.ts'

// For a test: a process that rewrites one file until it is killed. Each content is one letter, many times over.
const path = process.argv[2] ?? ''
for (let i = 0; ; i += 1) {
  await writeAtomically(path, String.fromCharCode(97 + (i % 26)).repeat(200_000 + (i % 7) * 100_000))
  if (i === 0) process.stdout.write('writing\n')
}
