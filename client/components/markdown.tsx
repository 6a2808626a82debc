import { lazy, Suspense } from 'react';

const MarkdownText = lazy(async () => ({ default: (await import('./markdown-text')).MarkdownText }));

/** A note's Markdown as reading text. Raw HTML and pictures in it are not drawn. */
export function Markdown({ text }: { text: string }) {
  return (
    <div className="prose-serif max-w-prose">
      <Suspense fallback={<p className="whitespace-pre-wrap">{text}</p>}>
        <MarkdownText text={text} />
      </Suspense>
    </div>
  );
}
