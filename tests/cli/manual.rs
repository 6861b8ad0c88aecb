//! `modewright completions` and `modewright manual`.

use super::{fine, wrong};

const COMMANDS: [&str; 6] = [
    "check",
    "materials",
    "new",
    "schema",
    "completions",
    "manual",
];

#[test]
fn every_shell_learns_every_command() {
    for shell in ["bash", "elvish", "fish", "powershell", "zsh"] {
        let script = fine(&["completions", shell]);
        for command in COMMANDS {
            assert!(script.contains(command), "{shell}: {command}");
        }
        assert!(script.contains("temperature"), "{shell}");
    }
    assert!(wrong(&["completions", "nonsense"]).contains("fish"));
}

#[test]
fn the_manual_has_a_page_for_the_program_and_for_every_command() {
    let page = fine(&["manual"]);
    assert!(page.contains(".TH modewright 1"));
    for command in COMMANDS {
        assert!(page.contains(&format!("modewright\\-{command}(1)")));
        let page = fine(&["manual", command]);
        assert!(page.contains(&format!(".TH modewright-{command} 1")));
        assert!(page.contains("Example"));
    }
    assert!(wrong(&["manual", "chek"]).contains("did you mean check?"));
}
