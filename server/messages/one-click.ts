/**
 * Whether a body is the one that a mail program sends by RFC 8058 section 3.2, `List-Unsubscribe=One-Click`, in either form
 * that it allows: URL-encoded or multipart.
 */
export async function isOneClick(body: Buffer, contentType: string): Promise<boolean> {
  try {
    const headers = { 'content-type': contentType };
    const form = await new Response(new Uint8Array(body), { headers }).formData();
    return form.get('List-Unsubscribe') === 'One-Click';
  } catch {
    // What cannot be read as a form is none.
    return false;
  }
}
