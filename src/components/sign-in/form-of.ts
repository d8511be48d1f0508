/** What came with a form that was refused, to be shown in it again; never for passwords. Empty when nothing was posted. */
export async function formOf(request: Request): Promise<(name: string) => string> {
  if (request.method !== 'POST') return () => '';
  const form = await request
    .clone()
    .formData()
    .catch(() => null);
  return (name) => {
    const value = form?.get(name);
    return typeof value === 'string' ? value : '';
  };
}
