import { mkdir, writeFile } from 'node:fs/promises'
import { dirname, join } from 'node:path'
import { fileURLToPath } from 'node:url'
import { badFiles } from './badFiles.js'
import { deviceFolders, shapeDevices } from './deviceFolders.js'
import { shapedFiles } from './shapes.js'
import { truthOfDevices, truthOfShapes } from './truth.js'

/** Every example file under its path below `files/`; the same bytes in every run. */
export function exampleFiles(): Map<string, Buffer> {
  const files = new Map<string, Buffer>()
  const json = (value: unknown) => Buffer.from(`${JSON.stringify(value, null, 2)}\n`)
  for (const { name, bytes } of shapedFiles()) files.set(`shapes/${name}`, bytes)
  for (const { name, description } of shapeDevices()) files.set(`shapes/${name}`, json(description))
  for (const folder of deviceFolders())
    for (const [name, content] of Object.entries(folder.files))
      files.set(`${folder.name}/${name}`, typeof content === 'string' ? Buffer.from(content) : json(content))
  for (const { name, bytes } of badFiles()) files.set(`bad/${name}`, bytes)
  files.set('bad/expected.json', json(badFiles().map(({ name, what, code, line }) => ({ name, what, code, line }))))
  files.set('truth.json', json({ spectrum: 'AM1.5G', shapes: truthOfShapes(), devices: truthOfDevices() }))
  return files
}

async function writeExamples(folder: string): Promise<void> {
  for (const [name, bytes] of exampleFiles()) {
    const path = join(folder, name)
    await mkdir(dirname(path), { recursive: true })
    await writeFile(path, bytes)
  }
}

const here = fileURLToPath(import.meta.url)
if (process.argv[1] === here) await writeExamples(join(dirname(here), 'files'))
