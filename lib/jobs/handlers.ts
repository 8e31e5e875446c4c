import { importFilesHandler, type JobTools } from './handlers/import-files';
import { tellImportHandler } from './handlers/tell-import';
import { importFilesJob, tellImportJob, type QueueName } from './registry';

/** What is done with a job, by its queue. A payload that cannot be read throws a ZodError. */
export type Handlers = Record<QueueName, (data: unknown) => Promise<void>>;

/** The one place where a queue gets its handler. */
export function handlersOf(tools: JobTools): Handlers {
  return {
    'import-files': (data) => importFilesHandler(tools, importFilesJob.parse(data)),
    'tell-import': (data) => tellImportHandler(tools.db, tellImportJob.parse(data)),
  };
}
