/** A constant typed as an expression, checked by the engine before it joins the basis. */
import { useId, useState } from 'react';
import { quickEngine } from '../engine.ts';
import { sentenceOf } from '../state/search.ts';

export function TypeConstant({ basis, onAdd }: { basis: readonly string[]; onAdd: (text: string) => void }) {
  const [text, setText] = useState('');
  const [complaint, setComplaint] = useState('');
  const ids = { input: useId(), note: useId() };
  const add = async (): Promise<void> => {
    if (text.trim() === '') return;
    try {
      const { elements } = await quickEngine.call('basis', { basis: [text] });
      const canonical = elements[0]?.text ?? text;
      if (basis.includes(canonical)) {
        setComplaint(`${canonical} is in the basis already.`);
        return;
      }
      onAdd(canonical);
      setText('');
      setComplaint('');
    } catch (error) {
      setComplaint(sentenceOf(error));
    }
  };
  return (
    <form
      className="field"
      onSubmit={(event) => {
        event.preventDefault();
        add();
      }}
    >
      <label htmlFor={ids.input}>Type a constant</label>
      <div className="joined">
        <input
          id={ids.input}
          className="mono"
          value={text}
          spellCheck={false}
          autoComplete="off"
          autoCapitalize="off"
          placeholder="pi^2*log(2)   sqrt(3)*Cl(2,pi/3)   zeta(-5,-1)"
          aria-invalid={complaint !== ''}
          aria-describedby={ids.note}
          onChange={(e) => {
            setText(e.target.value);
            setComplaint('');
          }}
        />
        <button type="submit">Add</button>
      </div>
      <p id={ids.note} className="note wrong" role="alert">
        {complaint}
      </p>
    </form>
  );
}
