/** The head of a table: a column a name. */
export const HeadRow = ({ names }: { readonly names: readonly string[] }) => (
  <thead>
    <tr>
      {names.map((name) => (
        <th scope="col" key={name}>
          {name}
        </th>
      ))}
    </tr>
  </thead>
);
