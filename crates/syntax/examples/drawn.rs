//! Draws each line of standard input as a text of its own (`⏎` stands for a line end).
#[path = "../tests/drawn/mod.rs"]
mod drawn;
fn main() {
    for line in std::io::stdin().lines().map_while(Result::ok) {
        println!("{line}\n    {}", drawn::drawn(&drawn::written(&line)).trim_end().replace('\n', "\n    "));
    }
}
