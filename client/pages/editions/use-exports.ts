import { keepPreviousData, useQuery } from '@tanstack/react-query';
import { exportOptions, exportPreview, type ExportRecipe } from '../../../shared/schemas/export';
import { keys } from '../../api/query-keys';
import { groupPath, request } from '../../api/request';

/** Which catalogues and columns can stand in a merged table. */
export function useExportOptions(group: string) {
  return useQuery({
    queryKey: [...keys.exports(group), 'options'],
    queryFn: ({ signal }) => request({ path: groupPath(group, 'exports', 'options'), answer: exportOptions, signal }),
  });
}

/** Number of rows and the first of them under a recipe. */
export function useExportPreview(group: string, recipe: ExportRecipe) {
  return useQuery({
    queryKey: [...keys.exports(group), 'preview', recipe],
    placeholderData: keepPreviousData,
    queryFn: ({ signal }) =>
      request({
        path: groupPath(group, 'exports', 'preview'),
        query: { recipe: JSON.stringify(recipe) },
        answer: exportPreview,
        signal,
      }),
  });
}
