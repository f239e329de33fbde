import { writeFile } from 'node:fs/promises'
import { SAMPLE_FILE_NAME, sampleFileText } from '@/lib/simulate/sample'

/** Writes the sample run again, byte for byte: node --import tsx db/make-sample.ts */
const target = new URL(`../public/${SAMPLE_FILE_NAME}`, import.meta.url)
await writeFile(target, sampleFileText())
