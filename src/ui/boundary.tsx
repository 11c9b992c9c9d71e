import { Component, type ComponentChildren } from 'preact';
import { screenText } from '../text/screens.ts';
import { Button } from './components/button.tsx';
import { Page } from './components/page.tsx';

interface Props {
  readonly onError: (error: unknown) => void;
  readonly children: ComponentChildren;
}

/** Our own mistakes end here: said plainly, noted in the error log, with what can be copied; kept readings are not touched. */
export class Boundary extends Component<Props, { error?: unknown }> {
  override componentDidCatch(error: unknown) {
    this.setState({ error });
    this.props.onError(error);
  }

  override render() {
    const { error } = this.state;
    if (error === undefined) return this.props.children;
    const detail = error instanceof Error ? `${error.name}: ${error.message}` : String(error);
    return (
      <Page title={screenText.trouble.title}>
        <p role="alert">{screenText.trouble.note}</p>
        <p class="note">{detail}</p>
        <div class="row">
          <Button kind="main" onClick={() => this.setState({})}>
            {screenText.trouble.again}
          </Button>
        </div>
      </Page>
    );
  }
}
