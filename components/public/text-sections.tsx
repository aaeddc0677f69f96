/** Headed paragraphs of a page that explains. */
export function TextSections({ sections }: { sections: readonly { key: string; title: string; text: string }[] }) {
  return sections.map(({ key, title, text }) => (
    <section key={key} className="psec">
      <h2>{title}</h2>
      <p className="col">{text}</p>
    </section>
  ));
}
