export { actingFrom } from '#db/queries/auditOrigin';
