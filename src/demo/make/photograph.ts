import sharp from 'sharp';

const escapeXml = (text: string) =>
  text.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('"', '&quot;');

/** A drawn stand-in for a photograph: a part, a scale and the car number in frame. JPEG. */
export const drawPhotograph = (car: string, what: string, seed: number): Promise<Buffer> => {
  const circles = Array.from({ length: 8 }, (_, i) => {
    const x = 190 + (i % 4) * 290;
    const y = 280 + Math.floor(i / 4) * 250;
    const r = 62 + ((seed * 7 + i * 13) % 11);
    return `<circle cx="${x}" cy="${y}" r="${r}" fill="#${i % 2 ? '8d9994' : '9aa6a1'}" stroke="#12202b" stroke-width="6"/><circle cx="${x}" cy="${y}" r="${r - 24}" fill="none" stroke="#44525c" stroke-width="3"/>`;
  });
  const ticks = Array.from(
    { length: 41 },
    (_, i) =>
      `<path d="M${100 + i * 25} 780v${i % 10 === 0 ? 44 : i % 5 === 0 ? 30 : 18}" stroke="#12202b" stroke-width="4"/>`,
  );
  const svg = `<svg xmlns="http://www.w3.org/2000/svg" width="1280" height="960">
<rect width="1280" height="960" fill="#c9cfc7"/>
<rect x="60" y="140" width="1160" height="580" fill="#b4bcb5" stroke="#12202b" stroke-width="8"/>
${circles.join('')}
<rect x="80" y="770" width="1060" height="70" fill="#fbfbf7"/>${ticks.join('')}
<rect x="60" y="40" width="220" height="90" fill="#1b3a8c"/>
<text x="170" y="108" font-family="sans-serif" font-size="64" font-weight="bold" fill="#ffffff" text-anchor="middle">${escapeXml(car)}</text>
<text x="310" y="104" font-family="sans-serif" font-size="44" fill="#12202b">${escapeXml(what)}</text>
<text x="60" y="920" font-family="sans-serif" font-size="28" fill="#44525c">Drawn for the demonstration</text>
</svg>`;
  return sharp(Buffer.from(svg)).jpeg({ quality: 80 }).toBuffer();
};
