import { createInterface } from 'node:readline'
import { takeStudyLock } from '../study-lock.ts'

// For a test: a process that takes the lock of each folder named on standard input, and says whether it got it. It keeps them all.
const token = process.argv[2] ?? ''
for await (const folder of createInterface({ input: process.stdin })) {
  const lock = await takeStudyLock(folder, token, Date.now)
  process.stdout.write(lock === null ? 'held\n' : 'taken\n')
}
