/** What a person must know before trusting anything on the page; the same sentences wherever they are shown. */
export const CAUTIONS: readonly string[] = [
  'For use by trained staff under local protocol.',
  'Recordings from the skin show electrical rhythm. They do not show whether the stomach contracts.',
  'No finding is a diagnosis, and Bicadence is not a monitor.',
  'It gives no instruction on fasting, medicines or test meals. With diabetes, allergy or trouble swallowing, local protocol decides.',
  'No conformity with any regulation is claimed. A person with regulatory duty decides before clinical use.',
  'Every figure depends on the settings printed with it.',
  'A heartbeat trace can itself identify a person. Treat whatever you save or send as personal data.',
];

/** What happens to a file that is opened. */
export const PRIVACY =
  'Files are read on this computer. Nothing of them is sent anywhere, and names are not kept.';
