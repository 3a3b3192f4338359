export { applyEdit, type Edit, EditError, editWords } from './apply-edit.js';
export {
  type CampaignFile,
  type FilePath,
  ID_LISTS,
  type IdList,
  isList,
  isObject,
  type JsonValue,
  pathText,
  valueAt,
} from './campaign-file.js';
export { backTo, type Change, edited, type History, historyOf, redone, undone } from './history.js';
