import type { FileService } from '../server/index.ts';

declare global {
  namespace App {
    interface Locals {
      service: FileService;
    }
  }
}
