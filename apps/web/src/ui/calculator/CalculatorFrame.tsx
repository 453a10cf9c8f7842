import Button from '@mui/material/Button';
import type { ReactNode } from 'react';
import { useNotices } from '../Notices';
import { PageFrame } from '../PageFrame';

/** The frame of a calculator: a page that needs no account and is shared by its address. */
export function CalculatorFrame({
  title,
  actions,
  below,
  children,
}: {
  title: string;
  /** Buttons beside "Copy the link". */
  actions?: ReactNode;
  below?: ReactNode;
  children: ReactNode;
}) {
  return (
    <PageFrame
      title={title}
      eyebrow="Calculator · needs no account · the address of this page holds what you typed"
      actions={
        <>
          <CopyLinkButton />
          {actions}
        </>
      }
      below={below}
    >
      {children}
    </PageFrame>
  );
}

function CopyLinkButton() {
  const announce = useNotices();
  return (
    <Button
      onClick={() =>
        void navigator.clipboard.writeText(window.location.href).then(
          () => announce('Link copied.'),
          () => announce('The browser did not allow copying: copy the address of this page.'),
        )
      }
    >
      Copy the link
    </Button>
  );
}
