//! Decoding undoes encoding, and encoding undoes decoding.

use proptest::collection::vec;
use proptest::prelude::*;
use stagebits_kernel::Stage;
use stagebits_kernel::image::{self, Header, ImageError};

use super::chains::{chains, headers};
use super::{decode, encode, image_of, sealed};

/// A header, and a chain with constants of its word length.
fn any_chain() -> impl Strategy<Value = (Header, super::TestChain)> {
    headers().prop_flat_map(|header| (Just(header), chains(header.word_bits())))
}

/// Accepted or refused, but never anything else; accepted only if it is the image of its chain.
fn accept_or_refuse(bytes: &[u8]) -> Result<(), TestCaseError> {
    if let Ok((header, chain)) = decode(bytes) {
        prop_assert_eq!(encode(&chain, header), bytes);
    }
    Ok(())
}

/// Room for `S` steps is enough, or the first bank beyond it is named.
fn needs_room<const S: usize>(
    bytes: &[u8],
    header: Header,
    chain: &super::TestChain,
) -> Result<(), TestCaseError> {
    let result = image::decode::<{ super::CAPACITY }, S>(bytes);
    let mut used = 0;
    for (number, stage) in (1..).zip(chain.stages()) {
        if let Stage::Bank(bank) = stage {
            used += usize::from(bank.steps);
        }
        if used > S {
            let capacity = S;
            prop_assert_eq!(result, Err(ImageError::TooManySteps { number, capacity }));
            return Ok(());
        }
    }
    prop_assert_eq!(encode(&result.expect("it has room").1, header), bytes);
    Ok(())
}

proptest! {
    #![proptest_config(ProptestConfig::with_cases(2_000))]

    #[test]
    fn every_chain_comes_back((header, chain) in any_chain()) {
        prop_assert_eq!(decode(&encode(&chain, header)), Ok((header, chain)));
    }

    #[test]
    fn a_buffer_takes_the_image_or_stays_as_it_was(
        (header, chain) in any_chain(), less in 1_usize..20, more in 1_usize..20,
    ) {
        let bytes = encode(&chain, header);
        let needed = bytes.len();
        let mut large = vec![0xa5; needed + more];
        prop_assert_eq!(image::encode(&chain, header, &mut large), Ok(needed));
        prop_assert_eq!(&large[..needed], bytes);
        prop_assert!(large[needed..].iter().all(|byte| *byte == 0xa5));
        let mut small = vec![0xa5; needed.saturating_sub(less)];
        let found = small.len();
        prop_assert_eq!(
            image::encode(&chain, header, &mut small),
            Err(ImageError::BufferTooSmall { needed, found })
        );
        prop_assert!(small.iter().all(|byte| *byte == 0xa5));
    }

    /// The capacity is the smallest that holds the chain.
    #[test]
    fn a_chain_needs_room_for_its_stages((header, chain) in any_chain()) {
        let bytes = encode(&chain, header);
        let result = image::decode::<3, { super::STEPS }>(&bytes);
        let stages = chain.stages().len();
        if stages <= 3 {
            prop_assert_eq!(encode(&result.expect("it has room").1, header), bytes);
        } else {
            prop_assert_eq!(result, Err(ImageError::TooManyStages { stages, capacity: 3 }));
        }
    }

    /// So is that of the steps of banks, down to none at all.
    #[test]
    fn a_chain_needs_room_for_the_steps_of_its_banks((header, chain) in any_chain()) {
        let bytes = encode(&chain, header);
        needs_room::<0>(&bytes, header, &chain)?;
        needs_room::<11>(&bytes, header, &chain)?;
    }

    #[test]
    fn any_bytes_are_accepted_or_refused(bytes in vec(any::<u8>(), 0..200)) {
        prop_assert!(decode(&bytes).is_err());
        if bytes.len() >= 17 {
            let mut bytes = bytes;
            bytes[..5].copy_from_slice(b"SBIM\x01");
            accept_or_refuse(&sealed(bytes))?;
        }
    }

    /// Tags and masks that mostly make sense, before bytes that need not.
    #[test]
    fn any_stages_are_accepted_or_refused(
        word_bits in 9_u8..34,
        stages in vec((any::<u8>(), any::<u8>(), vec(any::<u8>(), 0..30)), 0..4),
    ) {
        let count = stages.len() as u8;
        let bytes: Vec<u8> = stages
            .into_iter()
            .flat_map(|(tag, mask, rest)| [tag % 6, mask & 0x87].into_iter().chain(rest))
            .collect();
        accept_or_refuse(&image_of(word_bits, count, &bytes))?;
    }

    /// One byte or two of an image replaced, the checksum made right again.
    #[test]
    fn altered_images_are_accepted_or_refused(
        (header, chain) in any_chain(), places: [prop::sample::Index; 2], values: [u8; 2],
    ) {
        let mut bytes = encode(&chain, header);
        for (place, value) in places.iter().zip(values) {
            let place = place.index(bytes.len());
            bytes[place] = value;
        }
        accept_or_refuse(&sealed(bytes))?;
    }

    /// A byte of an image left out or doubled, length and checksum made right again.
    #[test]
    fn shifted_images_are_accepted_or_refused(
        (header, chain) in any_chain(), place: prop::sample::Index, double: bool,
    ) {
        let mut bytes = encode(&chain, header);
        let place = place.index(bytes.len());
        let byte = bytes.remove(place);
        if double {
            bytes.splice(place..place, [byte, byte]);
        }
        accept_or_refuse(&sealed(bytes))?;
    }
}
