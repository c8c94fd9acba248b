//! Shared helpers of the tests that look at Layshaft as a whole.

pub mod laws;

use std::path::{Path, PathBuf};
use std::process::Command;
use std::sync::OnceLock;

/// The program `layshaft`, built from the sources as they are, beside the tests that ask for it.
///
/// # Panics
/// It cannot be built.
#[must_use]
pub fn program() -> &'static Path {
    static PROGRAM: OnceLock<PathBuf> = OnceLock::new();
    PROGRAM.get_or_init(build)
}

/// Tests stand in `TARGET/PROFILE/deps`, programs in `TARGET/PROFILE`.
fn build() -> PathBuf {
    let test = std::env::current_exe().expect("a test knows where it is");
    let profile = test.ancestors().nth(2).expect("tests stand in a folder of their profile");
    let target = profile.parent().expect("profiles stand in the target folder");
    // What `cargo test` builds belongs to the profile `test`, in a folder that is called `debug`.
    let name = match profile.file_name().and_then(|name| name.to_str()) {
        Some("debug") | None => "test",
        Some(name) => name,
    };
    // A variable that cargo sets where it runs tests.
    #[allow(clippy::disallowed_methods, reason = "which cargo to ask is a matter of the environment")]
    let cargo = std::env::var("CARGO").unwrap_or_else(|_| String::from("cargo"));
    let built = Command::new(cargo)
        .args(["build", "--quiet", "--package", "layshaft", "--bin", "layshaft", "--profile", name])
        .arg("--target-dir")
        .arg(target)
        .current_dir(env!("CARGO_MANIFEST_DIR"))
        .status()
        .expect("cargo can be run");
    assert!(built.success(), "the program could not be built");
    let program = profile.join(format!("layshaft{}", std::env::consts::EXE_SUFFIX));
    assert!(program.is_file(), "{} was not built", program.display());
    program
}
