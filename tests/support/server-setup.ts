import type { TestProject } from 'vitest/node'
import { type TestServer, startServer } from './server'

declare module 'vitest' {
  interface ProvidedContext {
    server: TestServer
  }
}

/** One production server with its fakes for all files of a project. */
export default async function setup(project: TestProject) {
  const { process: _, kill: __, restart: ___, stop, ...server } = await startServer()
  project.provide('server', server)
  return stop
}
