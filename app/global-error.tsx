'use client';

/** Only when the layout itself fails: it draws its own page, without the look's style sheet. */
export default function GlobalError() {
  return (
    <html lang="en">
      <body style={{ font: '16px/1.5 Georgia, serif', color: '#14201a', background: '#f1f5ed', padding: 24 }}>
        <h1>Fallbright could not be drawn</h1>
        <p>What was logged is safe. Try again in a minute.</p>
        <button type="button" onClick={() => location.reload()}>
          Try again
        </button>
      </body>
    </html>
  );
}
