'use client';

import { useId, useRef, useState } from 'react';
import { Button } from '@/components/ui/Button';
import { PHOTO_LIMIT_BYTES, type PhotoBody } from '@/lib/contracts/photos';
import { ClientError } from '@/lib/client/fetcher';
import { useMe } from '@/lib/client/me';
import { keepPhoto, removePhoto, usePhotos, type HangOn, type PhotoPlace } from '@/lib/client/photos';
import { PhotoLook } from './PhotoLook';

interface PhotosProps {
  place: PhotoPlace;
  on: HangOn;
  /** Set where it is not the role alone that decides: a tasting note takes its author's. */
  own?: boolean;
}

const hangsOn = (photo: PhotoBody, on: HangOn) => ('entry' in on ? photo.entry === on.entry : 'lot' in on ? photo.lot === on.lot : photo.tasting === on.tasting);

const altOf = (photo: PhotoBody, index: number) => photo.caption ?? `Photo ${index + 1}${photo.by ? ` by ${photo.by}` : ''}`;

/** A word that opens the camera or the files; the photos it adds stand where `Photos` of the same thing is. */
export function AddPhoto({ place, on, own: byOwner = true }: PhotosProps) {
  const { may } = useMe();
  const { photos } = usePhotos(place);
  const [state, setState] = useState<'still' | 'sending'>('still');
  const [failed, setFailed] = useState<string | null>(null);
  const input = useRef<HTMLInputElement>(null);
  const id = useId();
  if (!byOwner || !may('entry' in on ? 'entries.create' : 'lot' in on ? 'lots.serve' : 'tastings.write')) return null;

  async function send(files: FileList | null) {
    if (!files || files.length === 0) return;
    setFailed(null);
    setState('sending');
    try {
      for (const file of files) {
        if (file.size > PHOTO_LIMIT_BYTES) throw new ClientError(413, 'too-large', `${file.name} is larger than ${PHOTO_LIMIT_BYTES / 1e6} MB.`);
        await keepPhoto(place, on, file);
      }
    } catch (error) {
      setFailed(error instanceof ClientError ? (error.fields.photo?.[0] ? `The photo ${error.fields.photo[0]}.` : error.message) : 'The photo was not kept. Try again.');
    } finally {
      setState('still');
      if (input.current) input.current.value = '';
    }
  }

  return (
    <>
      <label htmlFor={id} className="not-printed type-tick relative inline-flex min-h-6 cursor-pointer items-center whitespace-nowrap text-ink3 underline decoration-rule2 underline-offset-2 hover:text-ink max-strip:min-h-11">
        <input ref={input} id={id} type="file" accept="image/jpeg,image/png,image/webp,image/avif" multiple disabled={state === 'sending'} className="absolute inset-0 cursor-pointer opacity-0" onChange={(event) => void send(event.target.files)} />
        {state === 'sending' ? 'keeping the photo' : photos?.some((photo) => hangsOn(photo, on)) ? 'add another photo' : 'add a photo'}
      </label>
      <span role="status" className="type-label text-madder empty:absolute">
        {failed}
      </span>
    </>
  );
}

/** Photos of one thing: small ones in a row, large at a tap, and a word to add one, unless that stands elsewhere. */
export function Photos({ adding = true, ...props }: PhotosProps & { adding?: boolean }) {
  const { place, on } = props;
  const { may } = useMe();
  const mayRemove = may('entries.remove');
  const { photos } = usePhotos(place);
  const [failed, setFailed] = useState<string | null>(null);
  const [shown, setShown] = useState<string | null>(null);
  const own = (photos ?? []).filter((photo) => hangsOn(photo, on));
  const open = own.find((photo) => photo.id === shown);
  if (own.length === 0 && !adding) return null;

  return (
    <div className="flex flex-wrap items-center gap-2 pt-1 empty:hidden">
      {own.map((photo, index) => (
        <button key={photo.id} type="button" className="border border-ink bg-well" onClick={() => setShown(photo.id)} aria-label={`Look at: ${altOf(photo, index)}`}>
          {/* Already small, and behind an address that ends: nothing to optimise. */}
          {/* eslint-disable-next-line @next/next/no-img-element -- a signed address that ends: nothing may load, shrink or keep it on the way */}
          <img src={photo.small} alt="" loading="lazy" className="block h-[84px] w-[132px] object-contain" />
        </button>
      ))}
      {adding && <AddPhoto {...props} />}
      <span role="status" className="type-label text-madder">
        {failed}
      </span>
      {open && (
        <PhotoLook
          photo={open}
          words={altOf(open, own.indexOf(open))}
          onClose={() => setShown(null)}
          actions={
            (open.mine || mayRemove) && (
              <Button look="final" onClick={() => void removePhoto(place, open.id).then(() => setShown(null), () => setFailed('The photo is still there. Try again.'))}>
                Take it off
              </Button>
            )
          }
        />
      )}
    </div>
  );
}
