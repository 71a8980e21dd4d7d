export { refusalOfRequest, SECURITY_HEADERS, type RequestFacts } from './access.ts';
export { eventStream } from './event-stream.ts';
export { fileRefusal } from './file-error.ts';
export { listReply, openReply, refusalReply, saveReply, type Reply } from './replies.ts';
export { FOLDER_VARIABLE, openService, PORT_VARIABLE, type FileService } from './service.ts';
export { decodeWorksheet, refuseSize } from './worksheet-bytes.ts';
export { openFolder, type WorksheetFolder } from './worksheet-folder.ts';
