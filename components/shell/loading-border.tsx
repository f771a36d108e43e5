/** The border under the head fills while a page is on its way. */
export const LoadingBorder = () => <div className="graduated-filling" aria-hidden />;
