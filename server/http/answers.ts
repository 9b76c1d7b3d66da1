/** What handlers answer, by status. */
export const ok = <B>(body: B) => ({ status: 200 as const, body });
export const created = <B>(body: B) => ({ status: 201 as const, body });
export const noContent = () => ({ status: 204 as const });
