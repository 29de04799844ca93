export { changedFields } from './changes';
export { type AuditActor, type AuditSubject, auditInsert } from './entry';
