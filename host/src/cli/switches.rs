//! The state of a chain's banks as an argument.

use crate::plan::{Plan, Switches};

/// Reads one word for each bank of `plan`, separated by commas: binary behind `0b`, hexadecimal
/// behind `0x`, decimal otherwise.
///
/// # Errors
/// What is wrong and what would be right, where a word is none or the words do not fit the banks.
pub(super) fn parse_switches(text: &str, plan: &Plan) -> Result<Switches, String> {
    let fault = |what: String, help: &str| format!("--switches '{text}': {what}; {help}");
    let banks: Vec<_> = plan.banks().collect();
    if banks.is_empty() {
        let what = "the chain has no bank".to_owned();
        return Err(fault(what, "leave the option out"));
    }
    let words: Vec<_> = text.split(',').map(str::trim).collect();
    if words.len() != banks.len() {
        let names: Vec<_> = banks.iter().map(|(stage, _)| &stage.name[..]).collect();
        let what = format!("{} words for {} banks", words.len(), banks.len());
        let help = format!("write one for each of {}", names.join(", "));
        return Err(fault(what, &help));
    }
    let mut switches = Switches::OFF;
    for ((place, word), (stage, bank)) in switches.words.iter_mut().zip(words).zip(banks) {
        let Some(number) = number(word) else {
            let what = format!("'{word}' is no word");
            return Err(fault(what, "write for example 0b101, 0x5 or 5"));
        };
        if number > bank.all_on().into() {
            let what = format!("'{word}' has a bit beyond the steps of {}", stage.name);
            let help = format!("write 0b0 to {:#b}", bank.all_on());
            return Err(fault(what, &help));
        }
        *place = number as u16;
    }
    Ok(switches)
}

fn number(text: &str) -> Option<u64> {
    let (digits, radix) = match text.split_at_checked(2) {
        Some(("0b", digits)) => (digits, 2),
        Some(("0x", digits)) => (digits, 16),
        _ => (text, 10),
    };
    // a sign is none of a word's digits
    let signed = digits.starts_with(['+', '-']);
    u64::from_str_radix(digits, radix).ok().filter(|_| !signed)
}
