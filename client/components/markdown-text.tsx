import ReactMarkdown, { type Components } from 'react-markdown';

/** Headings of a note stand below the headings of the page; links leave without telling where they came from. */
const PARTS: Components = {
  h1: ({ children }) => <h4>{children}</h4>,
  h2: ({ children }) => <h4>{children}</h4>,
  h3: ({ children }) => <h5>{children}</h5>,
  a: ({ href, children }) => (
    <a href={href} rel="noopener noreferrer" target="_blank">
      {children}
    </a>
  ),
};

/** The lazy half of Markdown. */
export function MarkdownText({ text }: { text: string }) {
  return (
    <ReactMarkdown skipHtml disallowedElements={['img']} components={PARTS}>
      {text}
    </ReactMarkdown>
  );
}
