import { can } from '../../../shared/permissions'
import type { Me } from '../../../shared/schemas/auth'
import type { FileItem } from '../../../shared/schemas/files'

/** Own files by those who upload; any file by an administrator. */
export function mayDeleteFile(me: Me | undefined, file: FileItem): boolean {
  return can(me, 'file:any') || (can(me, 'file:upload') && file.uploadedBy?.id === me?.id)
}
