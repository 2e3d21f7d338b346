/** What an upload of samples may be: the file as it is sent, and each part of the form beside it. */
export const SAMPLES_FILE_LIMITS = { limitBytes: 512 * 2 ** 20, fieldBytes: 2 ** 21 }

export const SAMPLES_FILE_ENDINGS = ['.csv', '.txt', '.tsv', '.npy', '.npz', '.json', '.gz']
