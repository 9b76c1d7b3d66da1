/** The development server passes the API's calls on to the server that `npm run dev` started. */
export default {
  '/api': { target: `http://127.0.0.1:${process.env['PORT'] ?? 3000}`, secure: false },
};
