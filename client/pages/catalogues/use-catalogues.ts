import { keepPreviousData, useMutation, useQuery, useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import {
  catalogueAccepted,
  catalogueDetail,
  catalogueList,
  coverage,
  type NewCatalogue,
} from '../../../shared/schemas/catalogue';
import { uploadedFile } from '../../../shared/schemas/file';
import { mappingPreview, type ColumnMapping, type TextDialect } from '../../../shared/schemas/mapping';
import { keys } from '../../api/query-keys';
import { groupPath, request, upload, type UploadProgress } from '../../api/request';

/** The catalogues of the group, in order of arrival. */
export function useCatalogues(group: string) {
  return useQuery({
    queryKey: keys.catalogues(group),
    queryFn: ({ signal }) => request({ path: groupPath(group, 'catalogues'), answer: catalogueList, signal }),
  });
}

export function useCatalogue(group: string, label: string) {
  return useQuery({
    queryKey: keys.catalogue(group, label),
    queryFn: ({ signal }) => request({ path: groupPath(group, 'catalogues', label), answer: catalogueDetail, signal }),
  });
}

export function useCoverage(group: string, label: string, enabled: boolean) {
  return useQuery({
    queryKey: [...keys.catalogue(group, label), 'coverage'],
    enabled,
    queryFn: ({ signal }) =>
      request({ path: groupPath(group, 'catalogues', label, 'coverage'), answer: coverage, signal }),
  });
}

/** Sends a file and tells how far it is; `stop` ends it. */
export function useUpload(group: string) {
  const [progress, setProgress] = useState<UploadProgress | null>(null);
  const [stopper, setStopper] = useState<AbortController | null>(null);
  const mutation = useMutation({
    mutationFn: (file: File) => {
      const controller = new AbortController();
      setStopper(controller);
      setProgress({ sentBytes: 0, totalBytes: file.size });
      return upload(groupPath(group, 'files'), file, setProgress, uploadedFile, controller.signal);
    },
    onSettled: () => setProgress(null),
  });
  return { ...mutation, progress, stop: () => stopper?.abort() };
}

/** What the beginning of an uploaded file tells, read with parts of the dialect set by hand. */
export function useInspection(group: string, fileId: string | null, dialect: Partial<TextDialect>) {
  return useQuery({
    queryKey: [...keys.group(group), 'files', fileId, 'inspect', dialect],
    enabled: fileId !== null,
    queryFn: ({ signal }) =>
      request({
        method: 'POST',
        path: groupPath(group, 'files', fileId ?? '', 'inspect'),
        body: { dialect },
        answer: uploadedFile,
        signal,
      }),
  });
}

/** The first rows as they will be understood; null mapping: nothing is asked. */
export function usePreview(group: string, fileId: string, dialect: TextDialect, mapping: ColumnMapping | null) {
  return useQuery({
    queryKey: [...keys.group(group), 'files', fileId, 'preview', dialect, mapping],
    enabled: mapping !== null,
    placeholderData: keepPreviousData,
    queryFn: ({ signal }) =>
      request({
        method: 'POST',
        path: groupPath(group, 'files', fileId, 'preview'),
        body: { dialect, mapping },
        answer: mappingPreview,
        signal,
      }),
  });
}

export function useCreateCatalogue(group: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (body: NewCatalogue) =>
      request({ method: 'POST', path: groupPath(group, 'catalogues'), body, answer: catalogueAccepted }),
    onSuccess: () => client.invalidateQueries({ queryKey: keys.catalogues(group) }),
  });
}
