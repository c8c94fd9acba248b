//! Tells Zed how to start the language server: `layshaft lsp`, from the path or as the settings say.

use zed_extension_api::settings::LspSettings;
use zed_extension_api::{self as zed, Command, LanguageServerId, Result, Worktree};

struct Layshaft;

impl zed::Extension for Layshaft {
    fn new() -> Self {
        Self
    }

    fn language_server_command(&mut self, id: &LanguageServerId, worktree: &Worktree) -> Result<Command> {
        let set = LspSettings::for_worktree(id.as_ref(), worktree).ok().and_then(|settings| settings.binary);
        let command = set.as_ref().and_then(|binary| binary.path.clone());
        let command = command.or_else(|| worktree.which("layshaft")).ok_or(
            "`layshaft` is not on the path: install it with `cargo install --path crates/layshaft`, or set \
             `lsp.layshaft.binary.path`",
        )?;
        let args = set.and_then(|binary| binary.arguments).unwrap_or_else(|| vec![String::from("lsp")]);
        Ok(Command { command, args, env: worktree.shell_env() })
    }
}

zed::register_extension!(Layshaft);
