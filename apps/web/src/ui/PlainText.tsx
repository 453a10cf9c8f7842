import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import { colour } from '../theme/theme';

type Block = { kind: 'paragraph'; lines: string[] } | { kind: 'list'; items: string[] };

/** Text as people type it: blank lines part paragraphs, lines that begin with "- " are a list. No markup. */
export function PlainText({ text }: { text: string }) {
  return (
    <Box sx={{ maxWidth: 680, '& > * + *': { mt: 1.25 } }}>
      {blocksOf(text).map((block, index) =>
        block.kind === 'list' ? (
          <Box
            component="ul"
            key={index}
            sx={{
              my: 0,
              pl: 2.5,
              typography: 'reading',
              '& li': { pl: 0.5 },
              '& li::marker': { color: colour.accent },
            }}
          >
            {block.items.map((item, position) => (
              <li key={position}>{item}</li>
            ))}
          </Box>
        ) : (
          <Typography key={index} variant="reading" component="p" sx={{ whiteSpace: 'pre-line' }}>
            {block.lines.join('\n')}
          </Typography>
        ),
      )}
    </Box>
  );
}

export function blocksOf(text: string): Block[] {
  const blocks: Block[] = [];
  let previousWasBlank = true;
  for (const raw of text.split(/\r?\n/)) {
    const line = raw.trimEnd();
    const item = /^\s*[-–•*] +(.*)$/.exec(line)?.[1];
    const last = blocks.at(-1);
    if (line.trim() === '') {
      previousWasBlank = true;
      continue;
    }
    if (item !== undefined) {
      if (last?.kind === 'list') last.items.push(item);
      else blocks.push({ kind: 'list', items: [item] });
    } else if (!previousWasBlank && last?.kind === 'list' && /^\s/.test(raw)) {
      // An indented line goes on with the item above it.
      last.items[last.items.length - 1] += ` ${line.trim()}`;
    } else if (!previousWasBlank && last?.kind === 'paragraph') last.lines.push(line);
    else blocks.push({ kind: 'paragraph', lines: [line] });
    previousWasBlank = false;
  }
  return blocks;
}
